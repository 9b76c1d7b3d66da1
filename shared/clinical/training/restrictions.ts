import type { Modality } from '../prescribing/answer';
import type { WeeksSince } from './resistance';
import type { ResistancePolicy } from './resistance-policy';

export const restrictionKinds = [
  'sternum',
  'device-arm',
  'joint',
  'fall',
  'lifting',
  'oxygen',
  'pressure',
  'claudication',
] as const;
export type RestrictionKind = (typeof restrictionKinds)[number];

export type Machine = Modality | 'treadmill-run';

export interface RestrictionEffect {
  /** Machines that are not offered while it holds. */
  readonly withheld: readonly Machine[];
  /** Machines on which the tile shows the words. */
  readonly watched: readonly Machine[];
  /** What the tile says. */
  readonly words: string;
}

/** What each restriction means on the floor. Common practice; the words of an order prevail. */
export const restrictionEffects: Readonly<Record<RestrictionKind, RestrictionEffect>> = {
  sternum: {
    withheld: ['arm'],
    watched: ['stepper'],
    words: 'Sternum healing: no pushing, pulling or lifting with the arms.',
  },
  'device-arm': {
    withheld: ['arm'],
    watched: ['stepper'],
    words: 'Device arm: below the shoulder, light loads.',
  },
  joint: {
    withheld: ['treadmill-run'],
    watched: ['treadmill-walk', 'step'],
    words: 'Joint: stop at pain, choose a machine without impact.',
  },
  fall: {
    withheld: ['treadmill-run', 'step'],
    watched: ['treadmill-walk'],
    words: 'Fall risk: stand by, seated machines first.',
  },
  lifting: { withheld: [], watched: [], words: 'Lifting limit as ordered.' },
  oxygen: { withheld: [], watched: [], words: 'Oxygen as ordered, saturation at each reading.' },
  pressure: { withheld: [], watched: [], words: 'Blood pressure ceiling: no breath-holding.' },
  claudication: {
    withheld: [],
    watched: ['treadmill-walk', 'treadmill-run', 'step'],
    words: 'Leg pain leads: rest at moderate pain, then go on.',
  },
};

/** A restriction that holds by policy because nobody has ordered otherwise. */
export interface DefaultRestriction {
  readonly kind: 'sternum' | 'device-arm' | 'pressure' | 'claudication';
  /** The week after the operation up to which it holds; null: without an end. */
  readonly untilWeek: number | null;
}

export interface RestrictionFacts {
  readonly sternotomy: WeeksSince;
  readonly device: WeeksSince;
  readonly dissection: boolean;
  readonly peripheralArteryDisease: boolean;
  /** What somebody has ordered or lifted: for these kinds the order holds, not the policy. */
  readonly ordered: readonly RestrictionKind[];
}

const holds = (since: WeeksSince, until: number): boolean =>
  since !== 'never' && (since === null || since < until);

/** The restrictions that the policy puts on a patient; what is not known counts as just done, and an order wins. */
export function defaultRestrictions(
  { sternotomy, device, dissection, peripheralArteryDisease, ordered }: RestrictionFacts,
  { upperAfterSternotomy, afterDevice }: ResistancePolicy,
): DefaultRestriction[] {
  const candidates: readonly (readonly [boolean, DefaultRestriction])[] = [
    [holds(sternotomy, upperAfterSternotomy), { kind: 'sternum', untilWeek: upperAfterSternotomy }],
    [holds(device, afterDevice), { kind: 'device-arm', untilWeek: afterDevice }],
    [dissection, { kind: 'pressure', untilWeek: null }],
    [peripheralArteryDisease, { kind: 'claudication', untilWeek: null }],
  ];
  return candidates.flatMap(([applies, restriction]) =>
    applies && !ordered.includes(restriction.kind) ? [restriction] : [],
  );
}

/** Machines that restrictions withhold. */
export const machinesWithheld = (kinds: readonly RestrictionKind[]): Machine[] => [
  ...new Set(kinds.flatMap((kind) => restrictionEffects[kind].withheld)),
];
