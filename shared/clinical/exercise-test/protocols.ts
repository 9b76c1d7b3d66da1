import type { Minutes } from '../../units';
import { minutes } from '../../units';

export const testProtocols = [
  'bruce',
  'modified-bruce',
  'naughton',
  'balke-ware',
  'ramp',
  'cycle-ramp',
  'other',
] as const;
/** `other` is none of these: stages are typed. */
export type TestProtocol = (typeof testProtocols)[number];

/** The protocols whose stages are printed; a ramp is made for the patient. */
export type TabledProtocol = Exclude<TestProtocol, 'ramp' | 'cycle-ramp' | 'other'>;

export const protocolNames: Readonly<Record<TestProtocol, string>> = {
  bruce: 'Bruce',
  'modified-bruce': 'Modified Bruce',
  naughton: 'Naughton',
  'balke-ware': 'Balke–Ware',
  ramp: 'Ramp',
  'cycle-ramp': 'Cycle ramp',
  other: 'None of these',
};

export const protocolSources: Readonly<Record<TabledProtocol, string>> = {
  bruce: 'Bruce speeds and grades, as in a reference table citing Foster 1984 and Pollock 1982',
  'modified-bruce': 'Modified Bruce: two easier stages before the first of Bruce',
  naughton: 'Naughton, 2.0 mph; from memory',
  'balke-ware': 'Balke–Ware, 3.3 mph; from memory',
};

interface Stage {
  /** As printed: modified Bruce begins with 0 and ½. */
  readonly label: string;
  /** From the beginning of exercise. */
  readonly startsAt: Minutes;
  readonly minutes: Minutes;
}

export interface TreadmillStage extends Stage {
  readonly speedMph: number;
  readonly gradePercent: number;
  /** METs in print, both ends; null where none are. */
  readonly printedMets: readonly [lower: number, upper: number] | null;
}

type Row = Omit<TreadmillStage, 'startsAt' | 'minutes'>;

const row = (
  label: string,
  speedMph: number,
  gradePercent: number,
  printedMets: Row['printedMets'] = null,
): Row => ({ label, speedMph, gradePercent, printedMets });

const bruceRows: readonly Row[] = [
  row('1', 1.7, 10, [4, 5]),
  row('2', 2.5, 12, [7, 7]),
  row('3', 3.4, 14, [9, 10]),
  row('4', 4.2, 16, [12, 13]),
  row('5', 5, 18, [14, 16]),
  row('6', 5.5, 20, [17, 19]),
  row('7', 6, 22, [19, 22]),
  row('8', 6.5, 24),
  row('9', 7, 26),
  row('10', 7.5, 28),
];

/** Balke–Ware goes on by 1 % a minute; no one in this work passes 25 %. */
const balkeMinutes = 25;

const rowsOf: Readonly<Record<TabledProtocol, readonly Row[]>> = {
  bruce: bruceRows,
  'modified-bruce': [row('0', 1.7, 0), row('½', 1.7, 5), ...bruceRows],
  naughton: [0, 3.5, 7, 10.5, 14, 17.5].map((grade, index) => row(String(index + 1), 2, grade)),
  'balke-ware': Array.from({ length: balkeMinutes }, (_, index) =>
    row(String(index + 1), 3.3, index === 0 ? 0 : index + 1),
  ),
};

/** How long a stage lasts, min. */
const stageMinutes: Readonly<Record<TabledProtocol, number>> = {
  bruce: 3,
  'modified-bruce': 3,
  naughton: 3,
  'balke-ware': 1,
};

export interface NaughtonChoice {
  /** Both lengths are in use. */
  readonly minutesPerStage: 2 | 3;
  /** A stage of 1.0 mph on the level before the first. */
  readonly warmUp: boolean;
}

const timed = (rows: readonly Row[], each: number): TreadmillStage[] =>
  rows.map((stage, index) => ({
    ...stage,
    startsAt: minutes(index * each),
    minutes: minutes(each),
  }));

/** The printed stages of a protocol from its beginning; `protocolSources` tells where they come from. */
export const stagesOf = (protocol: TabledProtocol): TreadmillStage[] =>
  timed(rowsOf[protocol], stageMinutes[protocol]);

/** Naughton's stages as a laboratory runs them. */
export const naughtonStages = ({ minutesPerStage, warmUp }: NaughtonChoice): TreadmillStage[] =>
  timed(warmUp ? [row('0', 1, 0), ...rowsOf.naughton] : rowsOf.naughton, minutesPerStage);

/** The last stage that was finished by a time; null before the end of the first. */
export function lastFinishedStage<S extends Stage>(stages: readonly S[], time: Minutes): S | null {
  const finished = stages.filter(({ startsAt, minutes: length }) => startsAt + length <= time);
  return finished.at(-1) ?? null;
}
