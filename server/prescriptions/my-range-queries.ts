import { sql } from 'drizzle-orm';
import { isReviewFlag } from '@shared/clinical/range-flags';
import type { MyRange } from '@shared/contracts/my-range-contract';
import type { Transaction } from '../database/client';
import { fail } from '../http/failure';
import type { RangeInForce } from './range-in-force';
import { rangeInForce } from './range-in-force-queries';

interface PlaceRow extends Record<string, unknown> {
  readonly site: MyRange['site'];
  readonly setBy: string | null;
}

function told(range: RangeInForce, setBy: string): MyRange['range'] {
  const { lower, upper } = range.perceivedExertion;
  return {
    state: range.withdrawn.length > 0 ? 'review' : range.effortToday ? 'today' : 'in-force',
    changes: range.flags
      .filter((flag) => !isReviewFlag(flag))
      .map(({ fact, effect, at }) => ({ fact, effect, at })),
    target: range.patientTarget,
    tenSecondCount: range.tenSecondCount,
    stayUnder: range.ceiling?.value ?? null,
    resting: range.restingSeated,
    effort: { lower, upper },
    hasDefibrillator: range.icd.status !== 'none',
    setOn: range.activatedAt.toISOString(),
    setBy,
  };
}

/** What a patient is told of the own range, and whom to call. @throws Failure `not-found` */
export async function myRange(tx: Transaction, patientId: string, now: Date): Promise<MyRange> {
  const { rows } = await tx.execute<PlaceRow>(sql`
    SELECT json_build_object('name', s.name, 'phone', s.phone, 'timeZone', s.time_zone) AS site,
           (SELECT u.display_name FROM prescriptions p JOIN users u ON u.id = p.signed_by
             WHERE p.patient_id = pt.id AND p.status = 'active') AS "setBy"
      FROM patients pt JOIN sites s ON s.id = pt.site_id WHERE pt.id = ${patientId}`);
  const [place] = rows;
  if (!place) throw fail('not-found');
  const range = await rangeInForce(tx, patientId, now);
  return { site: place.site, range: range ? told(range, place.setBy ?? '') : null };
}
