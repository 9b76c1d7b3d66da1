/** Answers in the order of the questionnaire; null is not answered. */
export type Answers<A> = readonly (A | null)[];

/** How often, on the scale of the PHQ and GAD: 0 not at all to 3 nearly every day. */
export type FrequencyAnswer = 0 | 1 | 2 | 3;

/** A questionnaire that cannot be scored, with the items to ask, counted from 1. */
export interface Incomplete {
  readonly state: 'incomplete';
  readonly missing: readonly number[];
}

/** A questionnaire with every item answered. */
export interface Complete<Band extends string> {
  readonly state: 'complete';
  readonly total: number;
  readonly band: Band;
}

/** The items not answered, counted from 1. @throws RangeError for another number of items or an answer outside 0–3 */
export function missingItems(answers: Answers<number>, items: number): number[] {
  if (answers.length !== items) throw new RangeError(`${items} answers are expected`);
  if (answers.some((answer) => answer !== null && ![0, 1, 2, 3].includes(answer))) {
    throw new RangeError('an answer is 0, 1, 2 or 3');
  }
  return answers.flatMap((answer, index) => (answer === null ? [index + 1] : []));
}

export const sumOf = (answers: Answers<number>): number =>
  answers.reduce<number>((sum, answer) => sum + (answer ?? 0), 0);

/** The name of the last band that begins at or below the score. */
export function bandOf<Band extends string>(
  score: number,
  bands: readonly (readonly [from: number, band: Band])[],
  lowest: Band,
): Band {
  return bands.filter(([from]) => score >= from).at(-1)?.[1] ?? lowest;
}
