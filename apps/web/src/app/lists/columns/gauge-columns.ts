import type { Gauge } from '@riseback/network';
import { calendarDate, noDate } from '../../shared/calendar-date';
import { gaugePlaceName, gaugePlaceOps, gaugePlaces } from '../../shared/gauge-place';
import type { Column, ListContext } from './column';
import { keySet, quantityColumn, textColumn } from './column-kinds';

export { findPlace, gaugePlaces } from '../../shared/gauge-place';

export const GAUGE_COLUMNS: readonly Column<Gauge>[] = [
  {
    ...textColumn<Gauge>('gauges', 'tag', { title: 'Tag', group: 'element', widthPx: 96, maxLength: 64 }),
    show: ({ tag, id }) => tag ?? id,
    derived: ({ tag }) => tag === undefined,
  },
  placeColumn(),
  distanceColumn(),
  quantityColumn<Gauge>('gauges', 'elevationM', 'length', { title: 'Elevation', widthPx: 92 }),
  yesNoColumn('waterLeg', 'Water leg', 84),
  quantityColumn<Gauge>('gauges', 'rangeLowPa', 'gaugePressure', { title: 'Range from', widthPx: 108, optional: true }),
  quantityColumn<Gauge>('gauges', 'rangeHighPa', 'gaugePressure', { title: 'Range to', widthPx: 96, optional: true }),
  quantityColumn<Gauge>('gauges', 'accuracy', 'fraction', { title: 'Accuracy', widthPx: 84, optional: true }),
  quantityColumn<Gauge>('gauges', 'resolutionPa', 'pressureDifference', {
    title: 'Resolution',
    widthPx: 96,
    optional: true,
  }),
  dateColumn('calibratedOn', 'Calibrated on'),
  dateColumn('calibrationDueOn', 'Calibration due'),
  yesNoColumn('retired', 'Retired', 84),
];

function placeColumn(): Column<Gauge> {
  const nameOfPlace = (gauge: Gauge, { document }: ListContext): string => gaugePlaceName(gauge, document);
  return {
    key: 'place',
    title: 'On',
    group: 'element',
    widthPx: 110,
    value: nameOfPlace,
    editor: {
      by: 'text',
      optional: false,
      maxLength: 64,
      initial: nameOfPlace,
      suggestions: ({ document }) => gaugePlaces(document),
      propose: (text, gauge, { document }) => gaugePlaceOps(text ?? '', gauge, document),
    },
  };
}

function distanceColumn(): Column<Gauge> {
  return {
    key: 'distanceM',
    title: 'From its start',
    group: 'element',
    widthPx: 112,
    quantity: 'length',
    value: ({ distanceM }) => distanceM,
    editor: {
      by: 'quantity',
      quantity: 'length',
      optional: false,
      si: ({ distanceM }) => distanceM,
      propose: (distanceM, { id, pipe }, { document }) =>
        pipe === undefined
          ? { ok: false, reason: 'This gauge stands at an element. Put it on a pipe first, under On.' }
          : keySet(document, 'gauges', id, 'distanceM', distanceM),
    },
  };
}

function yesNoColumn(key: 'waterLeg' | 'retired', title: string, widthPx: number): Column<Gauge> {
  return {
    key,
    title,
    group: 'inputs',
    widthPx,
    value: (gauge) => (gauge[key] ? 'Yes' : 'No'),
    editor: {
      by: 'choice',
      choices: () => [
        { value: 'yes', word: 'Yes' },
        { value: 'no', word: 'No' },
      ],
      chosen: (gauge) => (gauge[key] ? 'yes' : 'no'),
      propose: (value, { id }, { document }) => keySet(document, 'gauges', id, key, value === 'yes'),
    },
  };
}

function dateColumn(key: 'calibratedOn' | 'calibrationDueOn', title: string): Column<Gauge> {
  return {
    key,
    title,
    group: 'inputs',
    widthPx: 116,
    value: (gauge) => gauge[key],
    editor: {
      by: 'text',
      optional: true,
      maxLength: 10,
      propose: (text, { id }, { document }) => {
        const date = text === undefined ? undefined : calendarDate(text);
        return date === null ? { ok: false, reason: noDate(text ?? '') } : keySet(document, 'gauges', id, key, date);
      },
    },
  };
}
