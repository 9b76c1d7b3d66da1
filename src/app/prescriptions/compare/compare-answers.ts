import type {
  Caution,
  Limit,
  PrescriptionAnswer,
  Workload,
} from '@shared/clinical/prescribing/answer';
import {
  ceilingReason,
  limitWords,
  maximumWords,
  methodWords,
  metsFloor,
  metsText,
  modalityWords,
  percentRange,
  rangeText,
  settingText,
} from '../../ui/words/prescription-words';
import { type Difference, difference, paired } from './difference';

type Said = (answer: PrescriptionAnswer) => string | null;

const said = (
  facts: readonly (readonly [string, Said])[],
  before: PrescriptionAnswer,
  after: PrescriptionAnswer,
): Difference[] => facts.map(([label, of]) => difference(label, of(before), of(after)));

/** What decides a session: what leads, the ceiling, effort and work. */
const mainFacts: readonly (readonly [string, Said])[] = [
  ['Target', ({ target }) => target && `${rangeText(target)} bpm`],
  ['Ceiling', ({ ceiling }) => ceiling && `${ceiling.value} bpm`],
  ['Effort', ({ perceivedExertion }) => `${rangeText(perceivedExertion)} RPE`],
  ['Work', ({ targetMets }) => targetMets && `${metsText(targetMets)} METs`],
  [
    'Work ceiling',
    ({ workCeilingMets }) =>
      workCeilingMets === null ? null : `${metsFloor(workCeilingMets)} METs`,
  ],
];

const otherFacts: readonly (readonly [string, Said])[] = [
  ['Why the ceiling', (answer) => ceilingReason(answer) || null],
  ['Leads', ({ leadBy }) => (leadBy === 'heart-rate' ? 'Heart rate' : 'Effort')],
  ['Method', ({ method }) => methodWords[method]],
  ['Maximum', ({ maximum }) => maximum && `${maximum.value} bpm, ${maximumWords[maximum.method]}`],
  ['Guide', ({ guide }) => guide && `${rangeText(guide)} bpm`],
  ['Asks at', ({ askLine }) => (askLine === null ? null : `${askLine} bpm`)],
  [
    'Highest rate of the test',
    ({ outerLimit }) => (outerLimit === null ? null : `${outerLimit} bpm`),
  ],
  ['Intensity', ({ intensity }) => `${percentRange(intensity)} of reserve`],
  [
    'Blood pressure at most',
    ({ pressureCeiling: it }) => it && `${it.systolic}/${it.diastolic} mmHg`,
  ],
  [
    'Oxygen saturation at least',
    ({ oxygenFloor }) => (oxygenFloor === null ? null : `${oxygenFloor} %`),
  ],
  [
    'The patient is told',
    ({ patientTarget }) => patientTarget && `${rangeText(patientTarget)} bpm`,
  ],
  ['Ten-second count', ({ tenSecondCount }) => tenSecondCount && rangeText(tenSecondCount)],
  ['Policy', ({ policyVersion }) => `version ${policyVersion}`],
  ['Engine', ({ engineVersion }) => `version ${engineVersion}`],
];

/** Target, ceiling, effort and work of two answers. */
export const compareMain = (before: PrescriptionAnswer, after: PrescriptionAnswer): Difference[] =>
  said(mainFacts, before, after);

/** Every line that two answers come to. */
export const compareResults = (
  before: PrescriptionAnswer,
  after: PrescriptionAnswer,
): Difference[] => said([...mainFacts, ...otherFacts], before, after);

const capital = (words: string): string => `${words.charAt(0).toUpperCase()}${words.slice(1)}`;

export function compareLimits(before: PrescriptionAnswer, after: PrescriptionAnswer): Difference[] {
  const text = (limit: Limit | null) =>
    limit && `${limit.value} bpm: ${limit.margin} below ${limit.threshold}`;
  return paired(before.limits, after.limits, ({ kind }) => kind).map((pair) => {
    const kind = (pair.before ?? pair.after)?.kind;
    return difference(kind ? capital(limitWords[kind]) : '', text(pair.before), text(pair.after));
  });
}

const pointWords: Readonly<Record<Workload['point'], string>> = {
  start: 'to start',
  limit: 'not past',
};

export function compareWorkloads(
  before: PrescriptionAnswer,
  after: PrescriptionAnswer,
): Difference[] {
  const key = ({ modality, point }: Workload) => `${modality} ${point}`;
  const text = (load: Workload | null) => load && settingText(load);
  return paired(before.workloads, after.workloads, key).map((pair) => {
    const load = pair.before ?? pair.after;
    const label = load ? `${modalityWords[load.modality]}, ${pointWords[load.point]}` : '';
    return difference(label, text(pair.before), text(pair.after));
  });
}

export interface CautionChange {
  readonly heading: string;
  readonly cautions: readonly Caution[];
}

/** What the later one warns of anew, no longer, and still. */
export function compareCautions(
  before: PrescriptionAnswer,
  after: PrescriptionAnswer,
): readonly CautionChange[] {
  const lacks = (answer: PrescriptionAnswer) => (caution: Caution) =>
    answer.cautions.every(({ code }) => code !== caution.code);
  const isGained = lacks(before);
  return [
    { heading: 'Gained', cautions: after.cautions.filter(isGained) },
    { heading: 'Lost', cautions: before.cautions.filter(lacks(after)) },
    { heading: 'In both', cautions: after.cautions.filter((one) => !isGained(one)) },
  ];
}
