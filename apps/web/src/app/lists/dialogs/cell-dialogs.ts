import { inject, Injectable } from '@angular/core';
import { MatDialog } from '@angular/material/dialog';
import { CONTROL_WORDS } from '@riseback/contracts';
import { FITTINGS } from '@riseback/hydraulics';
import {
  FITTING_KINDS,
  type FittingKind,
  type NetworkDocument,
  type PipeRun,
  setOp,
  type Trap,
  type TrapModel,
} from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { firstValueFrom, type Observable } from 'rxjs';
import type { DialogName } from '../columns/column';
import { riseM } from '../columns/pipe-columns';
import type { CellEdit } from '../grid/cell-editing';
import { type Field, type FieldValues, numberOf, textOf } from './field';
import { FieldsDialog, type FieldsDialogData } from './fields-dialog';
import { RowsDialog, type RowsDialogData } from './rows-dialog';

/** Dialogs for what does not fit into a cell. Each answers with one edit, or null when it was left. */
@Injectable({ providedIn: 'root' })
export class CellDialogs {
  private readonly dialog = inject(MatDialog);

  async open(dialog: DialogName, id: string, document: NetworkDocument, units: DisplayUnits): Promise<CellEdit | null> {
    switch (dialog) {
      case 'service':
        return this.service(id, document, units);
      case 'fittings':
        return this.fittings(id, document, units);
      case 'route':
        return this.route(id, document, units);
      case 'capacity':
        return this.capacity(id, document, units);
    }
  }

  /** Asks for a few values; undefined when left. */
  askFields(data: FieldsDialogData): Promise<FieldValues | undefined> {
    const reference = this.dialog.open<FieldsDialog, FieldsDialogData, FieldValues>(FieldsDialog, {
      data,
      width: '560px',
    });
    return closing(reference.afterClosed());
  }

  private askRows(data: RowsDialogData): Promise<readonly FieldValues[] | undefined> {
    const reference = this.dialog.open<RowsDialog, RowsDialogData, readonly FieldValues[]>(RowsDialog, {
      data,
      width: '560px',
    });
    return closing(reference.afterClosed());
  }

  private async service(id: string, document: NetworkDocument, units: DisplayUnits): Promise<CellEdit | null> {
    const trap = document.nodes.get(id)?.value;
    if (trap?.kind !== 'trap') return null;
    const values = await this.askFields(serviceForm(trap, units));
    if (values === undefined) return null;
    const service =
      textOf(values, 'kind') === 'constant'
        ? { kind: 'constant' }
        : {
            kind: 'modulating',
            control: textOf(values, 'control'),
            secondaryInletK: numberOf(values, 'secondaryInletK'),
            secondaryOutletK: numberOf(values, 'secondaryOutletK'),
          };
    return { label: `set service of ${trap.tag ?? id}`, ops: [setOp(document, 'nodes', id, 'service', service)] };
  }

  private async fittings(id: string, document: NetworkDocument, units: DisplayUnits): Promise<CellEdit | null> {
    const pipe = document.pipes.get(id)?.value;
    if (pipe === undefined) return null;
    const rows = await this.askRows(fittingsForm(pipe, units));
    if (rows === undefined) return null;
    const fittings = rows.map((row) => ({ kind: textOf(row, 'kind'), count: numberOf(row, 'count') }));
    return { label: `set fittings of ${pipe.tag ?? id}`, ops: [setOp(document, 'pipes', id, 'fittings', fittings)] };
  }

  private async route(id: string, document: NetworkDocument, units: DisplayUnits): Promise<CellEdit | null> {
    const pipe = document.pipes.get(id)?.value;
    if (pipe === undefined) return null;
    const rows = await this.askRows(routeForm(pipe, document, units));
    if (rows === undefined) return null;
    const pieces = rows.map((row) => ({ lengthM: numberOf(row, 'lengthM'), riseM: numberOf(row, 'riseM') }));
    const route = pieces.length === 0 ? undefined : pieces;
    return { label: `set route of ${pipe.tag ?? id}`, ops: [setOp(document, 'pipes', id, 'route', route)] };
  }

  private async capacity(id: string, document: NetworkDocument, units: DisplayUnits): Promise<CellEdit | null> {
    const model = document.trapModels.get(id)?.value;
    if (model === undefined) return null;
    const rows = await this.askRows(capacityForm(model, units));
    if (rows === undefined) return null;
    const points = rows.map((row) => ({
      differentialPa: numberOf(row, 'differentialPa'),
      flowKgS: numberOf(row, 'flowKgS'),
    }));
    const capacity = points.length === 0 ? undefined : points.sort((a, b) => a.differentialPa - b.differentialPa);
    return {
      label: `set capacity of ${model.name}`.slice(0, 120),
      ops: [setOp(document, 'trapModels', id, 'capacity', capacity)],
    };
  }
}

async function closing<T>(closed: Observable<T | undefined>): Promise<T | undefined> {
  return firstValueFrom(closed);
}

function serviceForm(trap: Trap, units: DisplayUnits): FieldsDialogData {
  const { service } = trap;
  const modulating = (values: FieldValues): boolean => values['kind'] === 'modulating';
  return {
    title: `Service of ${trap.tag ?? trap.id}`,
    note: 'A modulating valve before an exchanger lowers the steam pressure at part load, until the trap can no longer drain.',
    fields: [
      {
        key: 'kind',
        title: 'Service',
        by: 'choice',
        choices: [
          { value: 'constant', word: 'Constant' },
          { value: 'modulating', word: 'Modulating' },
        ],
      },
      {
        key: 'control',
        title: 'At part load',
        by: 'choice',
        choices: Object.entries(CONTROL_WORDS).map(([value, word]) => ({ value, word })),
        when: modulating,
      },
      { key: 'secondaryInletK', title: 'Heated from', by: 'quantity', quantity: 'temperature', when: modulating },
      { key: 'secondaryOutletK', title: 'Heated to', by: 'quantity', quantity: 'temperature', when: modulating },
    ],
    values: { control: 'varyingInlet', ...service },
    units,
    submitWord: 'Set',
    leaveWord: 'Keep as it is',
    judge: (values) =>
      modulating(values) && numberOf(values, 'secondaryOutletK') <= numberOf(values, 'secondaryInletK')
        ? 'What is heated leaves hotter than it came: give a higher second temperature.'
        : '',
  };
}

function fittingsForm(pipe: PipeRun, units: DisplayUnits): RowsDialogData {
  const kindWord = (kind: FittingKind): string => FITTINGS[kind].name;
  return {
    title: `Fittings of ${pipe.tag ?? pipe.id}`,
    note: 'Their losses are counted in the bore of this pipe.',
    fields: [
      {
        key: 'kind',
        title: 'Fitting',
        by: 'choice',
        choices: FITTING_KINDS.map((kind) => ({ value: kind, word: kindWord(kind) })),
      },
      { key: 'count', title: 'How many', by: 'quantity', quantity: 'count' },
    ],
    rows: pipe.fittings.map(({ kind, count }) => ({ kind, count })),
    fresh: { kind: 'elbow90', count: 1 },
    addWord: 'Add a fitting',
    units,
    judge: (rows) =>
      incomplete(rows, ['count']) ||
      (rows.some((row) => numberOf(row, 'count') < 1) ? 'Each row has at least one fitting; remove the others.' : ''),
  };
}

function routeForm(pipe: PipeRun, document: NetworkDocument, units: DisplayUnits): RowsDialogData {
  const rise = riseM(pipe, document) ?? 0;
  const shown = (metres: number): string => formatQuantity(metres, 'length', units, { withUnit: true });
  return {
    title: `Route of ${pipe.tag ?? pipe.id}`,
    note: `Pieces in the order of flow; together ${shown(pipe.lengthM)} long with a rise of ${shown(rise)}. Without pieces the pipe rises evenly.`,
    fields: [
      { key: 'lengthM', title: 'Length', by: 'quantity', quantity: 'length' },
      { key: 'riseM', title: 'Rise', by: 'quantity', quantity: 'length' },
    ],
    rows: (pipe.route ?? []).map(({ lengthM, riseM: pieceRiseM }) => ({ lengthM, riseM: pieceRiseM })),
    fresh: { riseM: 0 },
    addWord: 'Add a piece',
    units,
    judge: (rows) =>
      incomplete(rows, ['lengthM', 'riseM']) ||
      (rows.some((row) => numberOf(row, 'lengthM') < 0) ? 'A length is not below zero.' : ''),
  };
}

function capacityForm(model: TrapModel, units: DisplayUnits): RowsDialogData {
  const fields: Field[] = [
    { key: 'differentialPa', title: 'Differential', by: 'quantity', quantity: 'pressureDifference' },
    { key: 'flowKgS', title: 'Capacity', by: 'quantity', quantity: 'massFlow' },
  ];
  return {
    title: `Capacity of ${model.name}`,
    note: 'What the trap passes at each differential, from the maker’s table, without a sizing factor.',
    fields,
    rows: (model.capacity ?? []).map(({ differentialPa, flowKgS }) => ({ differentialPa, flowKgS })),
    fresh: {},
    addWord: 'Add a point',
    units,
    judge: (rows) => {
      const gap = incomplete(rows, ['differentialPa', 'flowKgS']);
      if (gap !== '') return gap;
      if (rows.some((row) => numberOf(row, 'differentialPa') <= 0 || numberOf(row, 'flowKgS') <= 0))
        return 'Differentials and capacities are above zero.';
      const differentials = new Set(rows.map((row) => numberOf(row, 'differentialPa')));
      return differentials.size < rows.length ? 'Two points have the same differential.' : '';
    },
  };
}

function incomplete(rows: readonly FieldValues[], keys: readonly string[]): string {
  const row = rows.findIndex((values) => keys.some((key) => typeof values[key] !== 'number'));
  return row < 0 ? '' : `Row ${String(row + 1)} is not complete.`;
}
