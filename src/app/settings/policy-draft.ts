import { FormControl, FormRecord } from '@angular/forms';
import {
  type PolicyFault,
  type PolicyKey,
  changedKeys,
  orderFaults,
  withValues,
} from '@shared/clinical/program-policy';
import { policyNumberSchema } from '@shared/contracts/policy-change-contract';
import type { PolicyItem } from '@shared/contracts/policy-in-force-contract';
import { zodValidator } from '../ui/field-error/zod-validator';

/** A number as it is typed: null when empty, text when it is none. */
export type Typed = number | string | null;

export type PolicyControls = FormRecord<FormControl<Typed>>;

export const policyControls = (items: readonly PolicyItem[]): PolicyControls =>
  new FormRecord(
    Object.fromEntries(
      items.map((item) => [
        item.key,
        new FormControl<Typed>(item.value, { validators: zodValidator(policyNumberSchema(item)) }),
      ]),
    ),
  );

/** What was typed, against the version that was read. */
export interface PolicyDraft {
  readonly values: Readonly<Record<string, number>>;
  readonly changed: readonly PolicyKey[];
  /** Numbers that do not fit together. */
  readonly faults: readonly PolicyFault[];
}

export function draftOf(
  items: readonly PolicyItem[],
  typed: Readonly<Record<string, Typed | undefined>>,
): PolicyDraft {
  const present = Object.fromEntries(items.map(({ key, value }) => [key, value]));
  const numbers = Object.fromEntries(
    Object.entries(typed).filter((pair): pair is [string, number] => typeof pair[1] === 'number'),
  );
  const next = withValues(present, numbers);
  const changed = changedKeys(present, next);
  const values = Object.fromEntries(changed.map(({ key }) => [key, next[key] ?? NaN]));
  return { values, changed, faults: orderFaults(next) };
}
