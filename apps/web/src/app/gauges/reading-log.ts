import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Reading, Round } from '@riseback/contracts';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { timeWords } from '../account/time-words';
import { WHY_NOT_WORDS } from '../readings/reading-words';
import { nameOf } from '../shared/element-words';

/** Everything that was read in a round, as it stood on the dial; what was corrected stands there struck through. */
@Component({
  selector: 'app-reading-log',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <div class="scroll" tabindex="0" role="region" aria-label="Table of the readings">
      <table>
        <thead>
          <tr>
            <th scope="col">Gauge</th>
            <th scope="col" class="number">On the dial, {{ unit() }}</th>
            <th scope="col">Taken</th>
            <th scope="col">By</th>
            <th scope="col">Note</th>
          </tr>
        </thead>
        <tbody>
          @for (row of rows(); track row.id) {
            <tr>
              <th scope="row">{{ row.name }}</th>
              <td class="number">
                @if (row.replaced) {
                  <del>{{ row.value }}</del> corrected
                } @else {
                  {{ row.value }}
                }
              </td>
              <td>{{ row.taken }}</td>
              <td>{{ row.by }}</td>
              <td class="note">
                {{ row.note }}
                @for (photo of row.photos; track photo) {
                  <a [href]="photo" target="_blank" rel="noopener">Photograph {{ $index + 1 }}</a>
                }
              </td>
            </tr>
          }
        </tbody>
      </table>
    </div>
  `,
  styleUrl: './reading-log.scss',
})
export class ReadingLog {
  readonly round = input.required<Round>();
  readonly units = input.required<DisplayUnits>();
  readonly unit = input.required<string>();
  readonly timeZone = input.required<string>();
  readonly photoUrl = input.required<(readingId: string, photoId: string) => string>();

  protected readonly rows = computed(() => {
    const { readings } = this.round();
    const replaced = new Set(readings.flatMap(({ replaces }) => replaces ?? []));
    return readings
      .toSorted((a, b) => a.takenAt.localeCompare(b.takenAt))
      .map((reading) => ({
        id: reading.id,
        name: nameOf(reading.gauge),
        value: this.valueOf(reading),
        replaced: replaced.has(reading.id),
        taken: timeWords(reading.takenAt, this.timeZone()),
        by: reading.personName,
        note: reading.note,
        photos: reading.photoIds.map((photoId) => this.photoUrl()(reading.id, photoId)),
      }));
  });

  private valueOf({ valuePa, whyNot }: Reading): string {
    if (valuePa !== undefined) return formatQuantity(valuePa, 'gaugePressure', this.units());
    return whyNot === undefined ? '' : `Not read: ${WHY_NOT_WORDS[whyNot].toLowerCase()}`;
  }
}
