import type { EntryField, Option } from './entry-form';
import { bpm, inUnit } from './units';

export function options<T extends string>(
  values: readonly T[],
  words: Readonly<Record<string, string>>,
): Option[] {
  return values.map((value) => ({ value, label: words[value] ?? value }));
}

export const date = (key: string, label: string): EntryField => ({ key, label, type: 'date' });

export const number = (key: string, label: string, unit: string): EntryField => ({
  key,
  label,
  type: 'number',
  units: [inUnit(unit)],
});

export const rate = (key: string, label: string): EntryField => ({
  key,
  label,
  type: 'number',
  units: [bpm],
});

export const note: EntryField = { key: 'note', label: 'Note', type: 'note' };
