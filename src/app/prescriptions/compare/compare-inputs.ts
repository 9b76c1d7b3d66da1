import type { PrescriptionRequest } from '@shared/clinical/prescribing';
import { thresholdWords, zoneWords } from '../../ui/words/clinical-words';
import { maximumWords, methodWords } from '../../ui/words/prescription-words';
import type { FieldSpec } from '../rests-on/field-specs';
import { rowWords } from '../rests-on/row-words';
import { type Row, type RowId, rows, valueAt } from '../rests-on/rows';
import { type Difference, type DifferenceGroup, difference, paired } from './difference';

/** What a field of the request says, in words; null where nothing is given. */
function fieldText(spec: FieldSpec, inputs: PrescriptionRequest): string | null {
  const value = valueAt(inputs, spec.path);
  if (value === null || value === undefined) return null;
  switch (spec.kind) {
    case 'number': {
      const shown = Number((Number(value) * (spec.factor ?? 1)).toFixed(2));
      return spec.unit === '' ? String(shown) : `${shown} ${spec.unit}`;
    }
    case 'choice':
      return spec.options.find((option) => option.value === value)?.label ?? null;
    case 'yes-no':
      return value === true ? 'Yes' : 'No';
  }
}

type Two = readonly [before: PrescriptionRequest, after: PrescriptionRequest];

function thresholdRows([before, after]: Two): Difference[] {
  const text = (one: PrescriptionRequest['thresholds'][number] | null) =>
    one &&
    `${one.heartRate} bpm${one.clearMets === null ? '' : `, clear to ${one.clearMets} METs`}`;
  return paired(before.thresholds, after.thresholds, ({ kind }) => kind).map((pair) => {
    const kind = (pair.before ?? pair.after)?.kind;
    return difference(kind ? thresholdWords[kind] : '', text(pair.before), text(pair.after));
  });
}

function zoneRows([before, after]: Two): Difference[] {
  const [was, is] = [before.devices.icd.zones, after.devices.icd.zones];
  return paired(was, is, ({ kind }) => kind).map((pair) => {
    const kind = (pair.before ?? pair.after)?.kind;
    const text = (zone: typeof pair.before) => zone && `${zone.rate} bpm`;
    return difference(
      `Zone: ${kind ? zoneWords[kind].toLowerCase() : ''}`,
      text(pair.before),
      text(pair.after),
    );
  });
}

function drugRows([before, after]: Two): Difference[] {
  const text = (inputs: PrescriptionRequest) => rowWords('rateActingDrugs', inputs, null).value;
  return [difference('Classes taken', text(before), text(after))];
}

/** The rows of lists, which no field of its own names. */
const listRows: Partial<Record<RowId, (two: Two) => Difference[]>> = {
  thresholds: thresholdRows,
  devices: zoneRows,
  rateActingDrugs: drugRows,
};

function groupOf({ id, label, fields, part }: Row, two: Two): DifferenceGroup {
  const [before, after] = two;
  const isThere = (inputs: PrescriptionRequest) =>
    !part || valueAt(inputs, part.name) !== null ? 'given' : null;
  // A part that both lack has no fields to tell of.
  const own = !isThere(before) && !isThere(after) ? [] : fields;
  const ofFields = own.map((spec) =>
    difference(spec.label, fieldText(spec, before), fieldText(spec, after)),
  );
  return { heading: label, rows: [...ofFields, ...(listRows[id]?.(two) ?? [])] };
}

function choiceGroup([before, after]: Two): DifferenceGroup {
  const method = ({ choice }: PrescriptionRequest) => choice.method && methodWords[choice.method];
  const maximum = ({ choice }: PrescriptionRequest) =>
    choice.maximum && maximumWords[choice.maximum];
  return {
    heading: 'Chosen way',
    rows: [
      difference('Method', method(before), method(after)),
      difference('Maximum', maximum(before), maximum(after)),
    ],
  };
}

/** Every input of two versions beside each other, field by field. */
export function compareInputs(
  before: PrescriptionRequest,
  after: PrescriptionRequest,
): DifferenceGroup[] {
  const two: Two = [before, after];
  return [...rows.map((row) => groupOf(row, two)), choiceGroup(two)].filter(
    (group) => group.rows.length > 0,
  );
}
