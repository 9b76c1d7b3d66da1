import { daysBetween } from '../../scheduling/wall-time';
import type { ResistancePolicy } from '../training/resistance-policy';
import type { WeeksSince } from '../training/resistance';
import type { RestrictionKind } from '../training/restrictions';
import { defaultRestrictions, restrictionEffects } from '../training/restrictions';
import { limitWords, restrictionWords } from './restriction-limits';

/** An order as it stands in the record, not entered in error. */
export interface RestrictionOrder {
  readonly kind: RestrictionKind;
  readonly limit: number | null;
  readonly diastolic: number | null;
  readonly detail: string;
  readonly until: string | null;
  readonly lifted: boolean;
}

export interface RestrictedRecord {
  readonly orders: readonly RestrictionOrder[];
  readonly events: readonly { readonly kind: string; readonly occurredOn: string }[];
  readonly dissection: boolean;
  readonly peripheralArteryDisease: boolean;
}

export interface StandingRestriction {
  readonly kind: RestrictionKind;
  /** As `Lifting limit 4.5 kg`. */
  readonly title: string;
  /** What it means on the floor, or the order's own words. */
  readonly words: string;
  /** Nobody ordered it: it holds by the program's policy. */
  readonly byPolicy: boolean;
}

const sternotomies: readonly string[] = ['bypass', 'valve', 'transplant'];

function weeksSince(
  { events }: RestrictedRecord,
  kinds: readonly string[],
  today: string,
): WeeksSince {
  const last = events
    .filter(({ kind }) => kinds.includes(kind))
    .map(({ occurredOn }) => occurredOn)
    .sort()
    .at(-1);
  return last === undefined ? 'never' : Math.floor(daysBetween(last, today) / 7);
}

const ofOrder = ({ kind, limit, diastolic, detail }: RestrictionOrder): StandingRestriction => ({
  kind,
  title: [restrictionWords[kind], limitWords(kind, limit, diastolic)].filter(Boolean).join(' '),
  words: detail === '' ? restrictionEffects[kind].words : detail,
  byPolicy: false,
});

/**
 * What holds on a local date: orders that nobody lifted and whose last day is not past, then what the policy puts where nobody ordered.
 * A valve is taken to have been replaced through the sternum, since the record does not tell: the stricter reading.
 */
export function standingRestrictions(
  record: RestrictedRecord,
  today: string,
  policy: ResistancePolicy,
): StandingRestriction[] {
  const { orders, dissection, peripheralArteryDisease } = record;
  const holding = orders.filter(
    ({ lifted, until }) => !lifted && (until === null || until >= today),
  );
  const byPolicy = defaultRestrictions(
    {
      sternotomy: weeksSince(record, sternotomies, today),
      device: weeksSince(record, ['device-implant'], today),
      dissection,
      peripheralArteryDisease,
      ordered: orders.map(({ kind }) => kind),
    },
    policy,
  );
  return [
    ...holding.map(ofOrder),
    ...byPolicy.map(({ kind, untilWeek }) => ({
      kind,
      title: restrictionWords[kind],
      words: `${restrictionEffects[kind].words}${untilWeek === null ? '' : ` Until week ${untilWeek}.`}`,
      byPolicy: true,
    })),
  ];
}
