import { dasiSource } from './dasi';
import { gad7Source } from './gad-7';
import { phq2Source } from './phq-2';
import { phq9Source } from './phq-9';

/** A questionnaire as a form shows it. The wording is kept as published, since the scores belong to it; recalled, to be checked against the form in use. */
export interface Questionnaire {
  readonly name: string;
  readonly question: string;
  readonly items: readonly string[];
  /** Each answer with what it counts; a *yes* of the DASI counts by its item. */
  readonly answers: readonly { readonly label: string; readonly value: number | boolean }[];
  readonly highest: number;
  readonly source: string;
}

const lastTwoWeeks =
  'Over the last 2 weeks, how often have you been bothered by any of the following problems?';

const howOften = [
  { label: 'Not at all', value: 0 },
  { label: 'Several days', value: 1 },
  { label: 'More than half the days', value: 2 },
  { label: 'Nearly every day', value: 3 },
] as const;

const firstTwo = [
  'Little interest or pleasure in doing things',
  'Feeling down, depressed, or hopeless',
] as const;

export const questionnaires = {
  'phq-2': {
    name: 'PHQ-2',
    question: lastTwoWeeks,
    items: firstTwo,
    answers: howOften,
    highest: 6,
    source: phq2Source,
  },
  'phq-9': {
    name: 'PHQ-9',
    question: lastTwoWeeks,
    items: [
      ...firstTwo,
      'Trouble falling or staying asleep, or sleeping too much',
      'Feeling tired or having little energy',
      'Poor appetite or overeating',
      'Feeling bad about yourself, or that you are a failure or have let yourself or your family down',
      'Trouble concentrating on things, such as reading the newspaper or watching television',
      'Moving or speaking so slowly that other people could have noticed, or the opposite: being so fidgety or restless that you have been moving around a lot more than usual',
      'Thoughts that you would be better off dead, or of hurting yourself in some way',
    ],
    answers: howOften,
    highest: 27,
    source: phq9Source,
  },
  'gad-7': {
    name: 'GAD-7',
    question: lastTwoWeeks,
    items: [
      'Feeling nervous, anxious, or on edge',
      'Not being able to stop or control worrying',
      'Worrying too much about different things',
      'Trouble relaxing',
      'Being so restless that it is hard to sit still',
      'Becoming easily annoyed or irritable',
      'Feeling afraid, as if something awful might happen',
    ],
    answers: howOften,
    highest: 21,
    source: gad7Source,
  },
  dasi: {
    name: 'Duke Activity Status Index',
    question: 'Can you do this?',
    items: [
      'Take care of yourself: eat, dress, bathe, use the toilet',
      'Walk indoors, such as around your house',
      'Walk a block or two on level ground',
      'Climb a flight of stairs or walk up a hill',
      'Run a short distance',
      'Do light work around the house, such as dusting or washing dishes',
      'Do moderate work around the house, such as vacuuming, sweeping floors or carrying groceries',
      'Do heavy work around the house, such as scrubbing floors or moving heavy furniture',
      'Do yard work, such as raking leaves, weeding or pushing a power mower',
      'Have sexual relations',
      'Take part in moderate recreation, such as golf, bowling, dancing, doubles tennis or throwing a ball',
      'Take part in strenuous sports, such as swimming, singles tennis, football, basketball or skiing',
    ],
    answers: [
      { label: 'Yes', value: true },
      { label: 'No', value: false },
    ],
    highest: 58.2,
    source: dasiSource,
  },
} as const satisfies Readonly<Record<string, Questionnaire>>;
