import { setImmediate } from 'node:timers/promises';
import { sql } from 'drizzle-orm';
import {
  effectParts,
  rangeEffect,
  type EffectPart,
  type RangeEffect,
  type RangeInBrief,
} from '@shared/clinical/program-policy';
import type { PrescriptionPolicy, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { ChangedRange, PolicyPreview } from '@shared/contracts/policy-change-contract';
import { mayOpenRecord } from '../accounts/access-policy';
import type { Actor } from '../accounts/actor';
import type { Transaction } from '../database/client';
import { statement } from '../database/statement';
import { mayRead } from '../patients/patients-policy';
import { rangesInForce } from './range-in-force-queries';

/** Changed ranges to a page. */
const shown = 100;
/** Evaluations between two turns of the event loop, a few milliseconds of work. */
const atOnce = 100;

interface ActiveRow {
  readonly id: string;
  readonly patientId: string;
  readonly userId: string | null;
  readonly siteId: string;
  readonly displayName: string;
  readonly recordNumber: string;
  readonly site: string;
  readonly inputs: PrescriptionRequest;
  readonly before: RangeInBrief;
  readonly policyVersion: number;
  readonly activatedAt: Date;
}

interface Changed {
  readonly row: ActiveRow;
  readonly effect: RangeEffect;
}

const readActive = statement<ActiveRow>(
  null,
  sql`
  SELECT p.id, p.patient_id AS "patientId", pt.user_id AS "userId", pt.site_id AS "siteId",
         pt.given_name || ' ' || pt.family_name AS "displayName", pt.record_number AS "recordNumber", s.name AS site,
         p.inputs, p.policy_version AS "policyVersion", p.activated_at AS "activatedAt",
         jsonb_build_object('leadBy', p.result -> 'leadBy', 'target', p.result -> 'target', 'guide', p.result -> 'guide',
           'askLine', p.result -> 'askLine', 'ceiling', p.result #> '{ceiling,value}',
           'perceivedExertion', (p.result -> 'perceivedExertion') - 'scale') AS before
    FROM prescriptions p
    JOIN patients pt ON pt.id = p.patient_id
    JOIN sites s ON s.id = pt.site_id
   WHERE p.status = 'active'`,
);

const moved = (from: number | undefined, to: number | undefined): number =>
  from === undefined || to === undefined ? 0 : Math.abs(to - from);

/** How much of a change it is for the patient: effort for rate before any number of beats. */
function weightOf({ row: { before }, effect: { after } }: Changed): number {
  if (after === null || after.leadBy !== before.leadBy) return 1000;
  const [from, to] = [before.target ?? before.guide, after.target ?? after.guide];
  return (
    moved(from?.lower, to?.lower) +
    moved(from?.upper, to?.upper) +
    moved(before.ceiling ?? undefined, after.ceiling ?? undefined)
  );
}

async function changedBy(
  rows: readonly ActiveRow[],
  present: PrescriptionPolicy,
  proposed: PrescriptionPolicy,
): Promise<Changed[]> {
  const changed: Changed[] = [];
  for (const [index, row] of rows.entries()) {
    if (index % atOnce === 0) await setImmediate();
    const effect = rangeEffect(row.inputs, present, proposed);
    if (effect) changed.push({ row, effect });
  }
  return changed
    .map((each) => ({ each, weight: weightOf(each) }))
    .sort((a, b) => b.weight - a.weight || (a.each.row.id < b.each.row.id ? -1 : 1))
    .map(({ each }) => each);
}

function countParts(changed: readonly Changed[]): Partial<Record<EffectPart, number>> {
  const counts = effectParts.map((part) => [
    part,
    changed.filter(({ effect }) => effect.parts.includes(part)).length,
  ]);
  return Object.fromEntries(counts.filter(([, count]) => count !== 0)) as Partial<
    Record<EffectPart, number>
  >;
}

function dueBy(rows: readonly ActiveRow[], { reviewDueDays }: PrescriptionPolicy, now: Date) {
  const since = now.getTime() - reviewDueDays * 24 * 3_600_000;
  return rows.filter(({ activatedAt }) => activatedAt.getTime() < since).length;
}

function present(
  actor: Actor,
  { row, effect }: Changed,
  withdrawn: ChangedRange['withdrawn'],
): ChangedRange {
  const { id, displayName, recordNumber, patientId, site, before, policyVersion } = row;
  const open = mayRead(actor, 'chart') && mayOpenRecord(actor, row);
  return {
    prescriptionId: id,
    patient: open ? { id: patientId, displayName, recordNumber } : null,
    site,
    parts: [...effect.parts],
    before,
    after: effect.after,
    why: effect.why,
    policyVersion,
    withdrawn,
  };
}

/**
 * What a proposed policy would make of every range in force, each from the facts that it was signed with.
 * @param offset how many of the changed ones, the heaviest first, to leave out
 */
export async function policyEffect(
  tx: Transaction,
  actor: Actor,
  policies: { readonly present: PrescriptionPolicy; readonly proposed: PrescriptionPolicy },
  { offset, now }: { readonly offset: number; readonly now: Date },
): Promise<PolicyPreview> {
  const rows = await readActive(tx, {});
  const changed = await changedBy(rows, policies.present, policies.proposed);
  const page = changed.slice(offset, offset + shown);
  const ranges = await rangesInForce(
    tx,
    page.map(({ row }) => row.patientId),
    now,
  );
  return {
    active: rows.length,
    changed: changed.length,
    byPart: countParts(changed),
    reviewsDue: {
      before: dueBy(rows, policies.present, now),
      after: dueBy(rows, policies.proposed, now),
    },
    items: page.map((each) =>
      present(actor, each, [...(ranges.get(each.row.patientId)?.withdrawn ?? [])]),
    ),
  };
}
