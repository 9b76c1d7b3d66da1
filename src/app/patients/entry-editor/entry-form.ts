import type { NewRecordEntryInput, RecordKind } from '@shared/contracts/record-contract';
import { recordValues } from '@shared/contracts/record-contract';
import type * as z from 'zod';
import type { Unit } from './units';

export interface Option {
  readonly value: string;
  readonly label: string;
}

interface FieldBase {
  /** The key of the entry's values. */
  readonly key: string;
  readonly label: string;
  readonly hint?: string;
}

/** One control of a form, by what is entered. */
export type EntryField = FieldBase &
  (
    | { readonly type: 'note' | 'date' | 'check' | 'yes-no' }
    | {
        readonly type: 'text';
        /** Left empty it is null. */
        readonly optional?: true;
        /** What may be meant by what was typed. */
        readonly suggest?: (typed: string) => readonly string[];
      }
    | { readonly type: 'marks'; readonly options: readonly Option[] }
    | {
        /** Questions with the same answers each; one value an item, null where none is given. */
        readonly type: 'items';
        readonly question: string;
        readonly items: readonly string[];
        readonly answers: readonly { readonly label: string; readonly value: number | boolean }[];
      }
    | { readonly type: 'number'; readonly units: readonly [Unit, ...Unit[]] }
    | {
        readonly type: 'choice';
        readonly options: readonly Option[];
        /** The words of no choice, where none may be left. */
        readonly none?: string;
      }
    | {
        readonly type: 'rows';
        readonly add: string;
        /** A table to run through by keyboard, instead of a block each. */
        readonly asGrid?: true;
        readonly fields: readonly EntryField[];
        readonly rules: Rules;
      }
  );

/** A contract's rule by key. */
export type Rules = Readonly<Record<string, z.ZodType>>;

/** What was read from a form, by key. */
export type Values = Record<string, unknown>;

/** A value made from what was typed, with what it means and where it comes from. */
export interface Line {
  readonly label: string;
  /** With its unit; null: why says why there is none. */
  readonly value: string | null;
  readonly judgment?: string | null;
  /** Whether the judgment asks for attention. */
  readonly isDue?: boolean;
  readonly source?: string | null;
  readonly why?: string | null;
}

/** A form that makes entries of the record. */
export interface EntryForm {
  readonly heading: string;
  readonly save: string;
  readonly fields: readonly EntryField[];
  readonly rules: Rules;
  /** What stands in the fields to begin with; dates begin with today. */
  readonly initial?: Values;
  /** @param idOf the id of the entry at a place, the same at every try */
  readonly toEntries: (values: Values, idOf: (index: number) => string) => NewRecordEntryInput[];
  /** Where the values of an entry stand in the form: '' or ending in a dot. */
  readonly pathOf: (index: number) => string;
  readonly saved: string;
  /** Shown below the fields while one types. */
  readonly lines?: (values: Values) => readonly Line[];
  /** What another choice in a field fills into others, by the key of that field; {} for nothing. */
  readonly fills?: Readonly<Record<string, (values: Values) => Values>>;
}

interface FormWords {
  readonly heading: string;
  readonly saved: string;
  readonly save?: string;
}

/** A form that makes one entry, its fields the values of the contract. */
export function formOf(
  kind: RecordKind,
  words: FormWords,
  fields: readonly EntryField[],
  initial: Values = {},
  fixed: Values = {},
): EntryForm {
  return {
    save: 'Save',
    ...words,
    fields,
    rules: recordValues[kind].shape,
    initial,
    toEntries: (values, idOf) => [
      { kind, id: idOf(0), values: { ...values, ...fixed } } as NewRecordEntryInput,
    ],
    pathOf: () => '',
  };
}
