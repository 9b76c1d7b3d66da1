import { sql, type SQL } from 'drizzle-orm';
import type { RangeInForce as RangeInShort } from '@shared/contracts/patients-contract';
import type { PrescriptionRequest } from '@shared/clinical/prescribing';
import {
  isReviewFlag,
  isTodayFlag,
  withdrawalReasonsOf,
  type RangeFlag,
} from '@shared/clinical/range-flags';
import type { WithdrawalReason } from '@shared/clinical/withdrawal';
import type { Transaction } from '../database/client';
import { statement } from '../database/statement';
import { presentFlag, rangeFlagsOf, type RawFlag } from '../patients/record-changes-queries';
import { standingOf, type RangeInForce, type Standing } from './range-in-force';

interface RangeRow {
  readonly patientId: string;
  readonly id: string;
  readonly status: 'active' | 'draft';
  readonly signed: Standing;
  readonly restingSeated: number;
  readonly icd: PrescriptionRequest['devices']['icd'];
  readonly activatedAt: Date | null;
  readonly flags: RawFlag[];
}

/** What touches the prescription `p` of the query around, as a JSON array of `RawFlag`. */
export const flagsOfPrescription = (now: SQL): SQL<RawFlag[]> =>
  rangeFlagsOf({
    patientId: sql`p.patient_id`,
    madeAt: sql`coalesce(p.changed_at, p.created_at)`,
    inputs: sql`p.inputs`,
    activatedAt: sql`p.activated_at`,
    now,
  });

/** What stands of a result; the rest (candidates, workloads …) is most of its bulk. */
const signed = sql`jsonb_build_object(
  'leadBy', p.result -> 'leadBy', 'target', p.result -> 'target', 'guide', p.result -> 'guide',
  'ceiling', p.result -> 'ceiling', 'askLine', p.result -> 'askLine', 'perceivedExertion', p.result -> 'perceivedExertion',
  'patientTarget', p.result -> 'patientTarget', 'tenSecondCount', p.result -> 'tenSecondCount')`;

const ofPatients = (which: SQL): SQL => sql`
  SELECT p.patient_id AS "patientId", p.id, p.status, ${signed} AS signed, p.activated_at AS "activatedAt",
         (p.inputs #>> '{resting,seated}')::float AS "restingSeated", p.inputs #> '{devices,icd}' AS icd,
         ${flagsOfPrescription(sql`${sql.placeholder('now')}::timestamptz`)} AS flags
    FROM prescriptions p
   WHERE p.patient_id = ANY(${sql.placeholder('patientIds')}::uuid[]) AND ${which}`;

const readActive = statement<RangeRow>('ranges-in-force', ofPatients(sql`p.status = 'active'`));
const readStates = statement<RangeRow>(
  'range-states',
  ofPatients(sql`(p.status = 'active' OR p.awaiting IS NOT NULL)`),
);

function rangeOf(row: RangeRow): RangeInForce {
  const {
    id: prescriptionId,
    status: _,
    signed: standing,
    activatedAt,
    flags: raw,
    ...facts
  } = row;
  const flags = raw.map(presentFlag);
  const withdrawn = withdrawalReasonsOf(flags);
  const effortToday = flags.some(isTodayFlag);
  return {
    ...facts,
    ...standingOf(standing, withdrawn.length > 0 || effortToday),
    prescriptionId,
    activatedAt: activatedAt ?? new Date(NaN),
    withdrawn,
    effortToday,
    reviewDue: flags.some(isReviewFlag),
    flags,
  };
}

/** The ranges in force of any number of patients, by patient, in one statement. */
export async function rangesInForce(
  tx: Transaction,
  patientIds: readonly string[],
  now: Date,
): Promise<ReadonlyMap<string, RangeInForce>> {
  if (patientIds.length === 0) return new Map();
  const rows = await readActive(tx, { patientIds, now });
  return new Map(rows.map((row) => [row.patientId, rangeOf(row)]));
}

/** @returns undefined while no range is in force */
export async function rangeInForce(
  tx: Transaction,
  patientId: string,
  now: Date,
): Promise<RangeInForce | undefined> {
  return (await rangesInForce(tx, [patientId], now)).get(patientId);
}

/** Where a patient's range stands, with what a list and a header say of it. */
export interface RangeState {
  /** Null when none is in force. A withdrawn one leads by effort, its ceiling stays. */
  readonly range: RangeInShort | null;
  readonly withdrawn: readonly WithdrawalReason[];
  /** Someone has to look at it; it stays in force. */
  readonly reviewDue: boolean;
  /** Each cause that touches it, the oldest first. */
  readonly flags: readonly RangeFlag[];
  readonly awaitsPhysician: boolean;
}

const none: RangeState = {
  range: null,
  withdrawn: [],
  reviewDue: false,
  flags: [],
  awaitsPhysician: false,
};

function inShort(row: RangeRow): Omit<RangeState, 'awaitsPhysician'> {
  const { prescriptionId, leadBy, target, ceiling, perceivedExertion, ...range } = rangeOf(row);
  const { lower, upper } = perceivedExertion;
  return {
    range: {
      prescriptionId,
      leadBy,
      target,
      ceiling: ceiling?.value ?? null,
      perceivedExertion: { lower, upper },
      since: range.activatedAt.toISOString(),
    },
    withdrawn: range.withdrawn,
    reviewDue: range.reviewDue,
    flags: range.flags,
  };
}

/** The state of each patient's range, by patient, in one statement. */
export async function rangesOf(
  tx: Transaction,
  patientIds: readonly string[],
  now: Date,
): Promise<(patientId: string) => RangeState> {
  const states = new Map<string, RangeState>();
  const rows = patientIds.length === 0 ? [] : await readStates(tx, { patientIds, now });
  for (const row of rows) {
    const state = states.get(row.patientId) ?? none;
    const more = row.status === 'active' ? inShort(row) : { awaitsPhysician: true };
    states.set(row.patientId, { ...state, ...more });
  }
  return (patientId) => states.get(patientId) ?? none;
}
