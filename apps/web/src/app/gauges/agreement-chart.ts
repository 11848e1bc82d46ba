import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { CHART, type AgreementFigure } from './agreement-figure';

/** What was read over what was expected, with the band within which both agree. */
@Component({
  selector: 'app-agreement-chart',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './agreement-chart.html',
  styleUrl: './agreement-chart.scss',
})
export class AgreementChart {
  readonly figure = input.required<AgreementFigure>();
  /** Stands out from the others. */
  readonly gaugeId = input('');

  protected readonly CHART = CHART;
}
