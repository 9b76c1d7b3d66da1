import type { Dice } from './dice';
import type { DiagnosisKind } from './situations';

export const payers = [
  { name: 'Medicare', weight: 40, from: 65 },
  { name: 'Medicare Advantage', weight: 22, from: 65 },
  { name: 'Commercial plan', weight: 24, from: 0 },
  { name: 'Medicaid', weight: 10, from: 0 },
  { name: 'Veterans’ benefits', weight: 4, from: 0 },
] as const;

export type LeavingReason =
  'stopped coming' | 'returned to work' | 'moved away' | 'died' | 'new event' | 'medical discharge';

/** What becomes of a course; the story finds out as it goes. */
export interface Fate {
  readonly plannedSessions: number;
  readonly pace: 2 | 3;
  /** Days from enrollment to the first class at the earliest; null: never comes. */
  readonly startsAfter: number | null;
  /** Of the places booked, the part that is used. */
  readonly reliability: number;
  readonly leaves: { readonly after: number; readonly reason: LeavingReason } | null;
  /** Away after so many sessions, for so many days; a closed course is opened again at the return. */
  readonly gap: { readonly after: number; readonly days: number; readonly closed: boolean } | null;
  /** Goes on in the class that people pay themselves. */
  readonly maintenance: boolean;
  /** What changes on the way. */
  readonly turn: Turn | null;
  /** Days that the signatures of the first range wait. */
  readonly signing: { readonly physiologist: number; readonly physician: number };
}

export interface Turn {
  readonly kind: 'dose raised' | 'tested again' | 'angina in class';
  /** Days after enrollment, at the earliest. */
  readonly afterDays: number;
}

/** The part of those who start that reaches the plan: invented, near one half as programs report. */
const completing: Record<DiagnosisKind, number> = {
  'heart-attack': 0.55,
  stent: 0.52,
  bypass: 0.66,
  valve: 0.62,
  transplant: 0.64,
  'stable-angina': 0.46,
  'heart-failure': 0.4,
  'assist-device': 0.5,
  other: 0.44,
};

const leavingReasons = [
  ['stopped coming', 46],
  ['returned to work', 19],
  ['medical discharge', 12],
  ['moved away', 9],
  ['new event', 9],
  ['died', 5],
] as const;

function plannedSessions(dice: Dice): number {
  return dice.weigh(
    [
      [36, 84],
      [24, 9],
      [18, 4],
      [12, 3],
    ] as const,
    ([, weight]) => weight,
  )[0];
}

function leavesOf(dice: Dice, planned: number): Fate['leaves'] {
  const after = 1 + Math.floor((planned - 3) * dice.next() ** 1.5);
  return { after, reason: dice.weigh(leavingReasons, ([, weight]) => weight)[0] };
}

function gapOf(dice: Dice): Fate['gap'] {
  if (!dice.chance(0.13)) return null;
  const closed = dice.chance(0.3);
  return {
    after: dice.whole(4, 18),
    days: closed ? dice.whole(40, 60) : dice.whole(12, 25),
    closed,
  };
}

function turnOf(dice: Dice, diagnosis: DiagnosisKind): Turn | null {
  if (!dice.chance(0.16)) return null;
  const kinds =
    diagnosis === 'stable-angina' || diagnosis === 'heart-attack'
      ? (['dose raised', 'tested again', 'angina in class'] as const)
      : (['dose raised', 'tested again'] as const);
  return { kind: dice.pick(kinds), afterDays: dice.whole(20, 48) };
}

/** Who a fate is drawn for. */
export interface FateOf {
  readonly diagnosis: DiagnosisKind;
  readonly age: number;
  readonly payer: string;
  /** 0 to 1, spread evenly over people, so that a small program still shows the rates that were meant. */
  readonly luck: number;
}

export function fateOf(dice: Dice, { diagnosis, age, payer, luck }: FateOf): Fate {
  const planned = plannedSessions(dice);
  const chance = completing[diagnosis] - (age > 80 ? 0.08 : 0) - (payer === 'Medicaid' ? 0.1 : 0);
  const completes = luck < chance;
  return {
    plannedSessions: planned,
    pace: dice.chance(0.86) ? 3 : 2,
    startsAfter: dice.chance(0.07) ? null : dice.whole(5, dice.chance(0.2) ? 16 : 8),
    reliability: dice.near(completes ? 0.91 : 0.84, 0.04),
    leaves: completes ? null : leavesOf(dice, planned),
    gap: gapOf(dice),
    maintenance: completes && dice.chance(0.85),
    turn: turnOf(dice, diagnosis),
    signing: { physiologist: dice.chance(0.25) ? 1 : 0, physician: dice.whole(1, 3) },
  };
}
