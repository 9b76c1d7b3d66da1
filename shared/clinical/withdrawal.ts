/** What takes a range out of force at once, until a new one is signed: effort leads, the ceiling stays. */
export const withdrawalReasons = ['drugs', 'rhythm', 'device', 'threshold', 'event'] as const;
export type WithdrawalReason = (typeof withdrawalReasons)[number];

/** Each reason in words, to follow "Withdrawn: ". */
export const withdrawalWords: Readonly<Record<WithdrawalReason, string>> = {
  drugs: 'a drug that acts on the heart rate was changed',
  rhythm: 'the rhythm has changed',
  device: 'a device or its settings have changed',
  threshold: 'a new threshold was found',
  event: 'an event or a procedure has happened',
};
