import { sql } from 'drizzle-orm';
import { isReviewFlag } from '@shared/clinical/range-flags';
import type { MyRange, ToldRange } from '@shared/contracts/my-range-contract';
import type { Transaction } from '../database/client';
import { fail } from '../http/failure';
import { programPolicyInForce } from './policy-queries';
import type { RangeInForce } from './range-in-force';
import { rangeInForce } from './range-in-force-queries';

type Signed = Pick<ToldRange, 'setBy' | 'signedBy' | 'cautions'>;

interface PlaceRow extends Record<string, unknown> {
  readonly patient: string;
  readonly site: MyRange['site'];
  readonly signed: Signed | null;
}

function told(range: RangeInForce, signed: Signed): ToldRange {
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
    ...signed,
  };
}

/**
 * What a patient is told of the own range, and whom to call.
 * @param program the program's name
 * @throws Failure `not-found`
 */
export async function myRange(
  tx: Transaction,
  patientId: string,
  { program, now }: { readonly program: string; readonly now: Date },
): Promise<MyRange> {
  const { rows } = await tx.execute<PlaceRow>(sql`
    SELECT pt.given_name || ' ' || pt.family_name AS patient,
           json_build_object('name', s.name, 'phone', s.phone, 'timeZone', s.time_zone) AS site,
           (SELECT json_build_object('setBy', u.display_name,
                     'signedBy', CASE WHEN d.id <> u.id THEN d.display_name END,
                     'cautions', jsonb_path_query_array(p.result, '$.cautions[*].code'))
              FROM prescriptions p
              JOIN users u ON u.id = p.signed_by
              LEFT JOIN users d ON d.id = p.physician_signed_by
             WHERE p.patient_id = pt.id AND p.status = 'active') AS signed
      FROM patients pt JOIN sites s ON s.id = pt.site_id WHERE pt.id = ${patientId}`);
  const [place] = rows;
  if (!place) throw fail('not-found');
  const { patient, site, signed } = place;
  const range = await rangeInForce(tx, patientId, now);
  const { sessionShape } = (await programPolicyInForce(tx.connection, now)).training;
  const { homePerWeek: perWeek, warmUpMinutes, coolDownMinutes } = sessionShape;
  return {
    program,
    patient,
    site,
    range: range && signed ? told(range, signed) : null,
    home: { perWeek, warmUpMinutes, coolDownMinutes },
  };
}
