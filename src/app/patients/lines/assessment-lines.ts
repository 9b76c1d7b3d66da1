import { scoreDasi } from '@shared/clinical/questionnaires/dasi';
import { scoreGad7 } from '@shared/clinical/questionnaires/gad-7';
import { scorePhq2 } from '@shared/clinical/questionnaires/phq-2';
import { isPhq9Positive, scorePhq9 } from '@shared/clinical/questionnaires/phq-9';
import type { Answers, FrequencyAnswer } from '@shared/clinical/questionnaires/answers';
import { questionnaires } from '@shared/clinical/questionnaires/questionnaires';
import { judgeScoreChange, scoreChanges } from '@shared/clinical/questionnaires/score-change';
import type { QuestionnaireKey } from '@shared/contracts/record-assessments-contract';
import { monitoringAdvice, monitoringSource } from '@shared/clinical/risk/monitoring';
import { riskFindings, riskNumbers, riskSource } from '@shared/clinical/risk/criteria';
import { type RecordedRisk, stratificationOf } from '@shared/clinical/risk/recorded-risk';
import { defaultStaffing } from '@shared/clinical/risk/staffing';
import type { Line } from '../entry-editor/entry-form';
import { type LineContext, dateOf, rounded, standing, wordOf } from './line-context';

type Values = Readonly<Record<string, unknown>>;

type Given = readonly (number | boolean | null)[];

interface Scored {
  readonly total: number | null;
  readonly words: string | null;
  readonly isDue: boolean;
  readonly missing: readonly number[];
}

const none = (missing: readonly number[]): Scored => ({
  total: null,
  words: null,
  isDue: false,
  missing,
});

function scoreOf(instrument: QuestionnaireKey, given: Given): Scored {
  const answers = given as Answers<FrequencyAnswer>;
  switch (instrument) {
    case 'phq-9': {
      const score = scorePhq9(answers);
      if (score.state === 'incomplete') return none(score.missing);
      const words = score.state === 'prorated' ? `${score.band}, prorated` : score.band;
      const missing = score.state === 'prorated' ? score.missing : [];
      return { total: score.total, words, isDue: isPhq9Positive(score) === true, missing };
    }
    case 'gad-7': {
      const score = scoreGad7(answers);
      if (score.state === 'incomplete') return none(score.missing);
      return { total: score.total, words: score.band, isDue: score.total >= 10, missing: [] };
    }
    case 'phq-2': {
      const score = scorePhq2(answers);
      if (score.state === 'incomplete') return none(score.missing);
      const positive = score.band === 'positive';
      const words = positive ? 'positive: the PHQ-9 is due' : 'negative';
      return { total: score.total, words, isDue: positive, missing: [] };
    }
    case 'dasi': {
      const score = scoreDasi(given as Answers<boolean>);
      if (score.state === 'incomplete') return none(score.missing);
      const words = `peak ${rounded(score.peakVo2, 1)} mL/kg/min, ${rounded(score.peakMets, 1)} METs`;
      return { total: score.total, words, isDue: false, missing: [] };
    }
  }
}

/** The total in short, for a list; null without one. */
export function scoreWords(instrument: QuestionnaireKey, given: Given): string | null {
  const { total, words } = scoreOf(instrument, given);
  return total === null ? null : `${total} of ${questionnaires[instrument].highest}, ${words}`;
}

function changeLine(instrument: QuestionnaireKey, total: number, first: number): Line | null {
  if (instrument !== 'phq-9' && instrument !== 'gad-7') return null;
  const change = judgeScoreChange(instrument, first, total);
  const { importantSource, important } = scoreChanges[instrument];
  return {
    label: 'Change against the first',
    value: `${change.change > 0 ? '+' : ''}${change.change}`,
    judgment: change.important
      ? `important, ${change.direction}`
      : `${change.direction === 'same' ? 'no change' : `${change.direction}, below what matters`}`,
    isDue: change.important && change.direction === 'worse',
    source: `${important} points matter: ${importantSource}`,
  };
}

/** The questionnaire's score, its band, the change, and what its ninth item asks for. */
export function questionnaireLines(values: Values, context: LineContext): Line[] {
  const instrument = wordOf<QuestionnaireKey>(values, 'instrument');
  const given = values['answers'] as Given | undefined;
  if (instrument === null || given?.length !== questionnaires[instrument].items.length) return [];
  const { total, words, isDue, missing } = scoreOf(instrument, given);
  const date = dateOf(values, 'answeredOn', context);
  const first = standing(context.record, 'questionnaires')
    .filter((entry) => entry.values.instrument === instrument && entry.values.answeredOn < date)
    .at(-1);
  const before = first ? scoreOf(instrument, first.values.answers).total : null;
  const change = total === null || before === null ? null : changeLine(instrument, total, before);
  const lines: Line[] = [
    {
      label: questionnaires[instrument].name,
      value: total === null ? null : `${total} of ${questionnaires[instrument].highest}`,
      judgment: words,
      isDue,
      source: questionnaires[instrument].source,
      why: missing.length > 0 ? `Not answered: ${missing.join(', ')}` : null,
    },
  ];
  if (instrument === 'phq-9' && Number(given[8] ?? 0) > 0) {
    lines.unshift({
      label: 'Ninth question',
      value: 'above zero',
      judgment: 'speak with the patient today',
      isDue: true,
      why: 'Whatever the total. It stays on Today until somebody has written what was done.',
    });
  }
  return change ? [...lines, change] : lines;
}

const criterionWords: Readonly<Record<string, { readonly label: string }>> = {
  ...riskFindings,
  ...riskNumbers,
};

const named = (criteria: readonly string[]): string =>
  criteria.map((each) => criterionWords[each]?.label ?? each).join('; ');

/** Whether the numbers are such that the criteria can be judged; half typed ones are not. */
export const isJudgeable = ({ ejectionFraction, capacity }: RecordedRisk): boolean =>
  (ejectionFraction === null || (ejectionFraction >= 0 && ejectionFraction <= 100)) &&
  (capacity === null || capacity > 0);

/** What the criteria come to, and the ECG and staff that follow. */
export function riskLines(values: Values): Line[] {
  const risk = values as unknown as RecordedRisk;
  if (!isJudgeable(risk)) return [];
  const { riskClass, treatAs, because, missing } = stratificationOf(risk);
  const each = treatAs === 'high' ? defaultStaffing.highRiskEach : defaultStaffing.patientsEach;
  return [
    {
      label: 'Class by the criteria',
      value: riskClass === 'undetermined' ? 'Not determined' : riskClass,
      judgment: riskClass === 'undetermined' ? `treat as ${treatAs}` : null,
      isDue: riskClass === 'undetermined',
      why: because.length > 0 ? named(because) : null,
      source: riskSource,
    },
    {
      label: 'Missing',
      value: missing.length === 0 ? 'nothing' : `${missing.length} criteria`,
      why: missing.length === 0 ? null : named(missing),
    },
    { label: 'ECG', value: monitoringAdvice[treatAs].text, source: monitoringSource },
    {
      label: 'Staff',
      value: `one to ${each} such patients, at least ${defaultStaffing.leastStaff} present`,
    },
  ];
}
