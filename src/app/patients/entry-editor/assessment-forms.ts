import { riskLevels } from '@shared/clinical/prescribing/request';
import { questionnaires } from '@shared/clinical/questionnaires/questionnaires';
import { type RiskFinding, riskFindings, riskNumbers } from '@shared/clinical/risk/criteria';
import { riskLevelOf } from '@shared/clinical/risk/override';
import { type RecordedRisk, stratificationOf } from '@shared/clinical/risk/recorded-risk';
import type { QuestionnaireKey } from '@shared/contracts/record-assessments-contract';
import { type NewRecordEntryInput, recordValues } from '@shared/contracts/record-contract';
import { riskWords } from '../../ui/words/clinical-words';
import { isJudgeable, questionnaireLines, riskLines } from '../lines/assessment-lines';
import type { LineContext } from '../lines/line-context';
import { date, note, number, options } from './common-fields';
import { type EntryForm, type Values, formOf } from './entry-form';

/** The items of one questionnaire, as published. */
export function questionnaireForm(instrument: QuestionnaireKey, context: LineContext): EntryForm {
  const { name, question, items, answers } = questionnaires[instrument];
  return {
    ...formOf(
      'questionnaires',
      { heading: name, saved: `${name} saved.`, save: `Save the ${name}` },
      [
        date('answeredOn', 'Answered on'),
        { key: 'answers', label: name, type: 'items', question, items, answers },
      ],
      {},
      { instrument },
    ),
    lines: (values) => questionnaireLines({ ...values, instrument }, context),
  };
}

const findingNames = Object.keys(riskFindings) as RiskFinding[];

/** The criteria as the entry keeps them, from a form that holds each as a field. */
function riskOf(values: Values): RecordedRisk & Values {
  const findings = Object.fromEntries(findingNames.map((name) => [name, values[name] ?? null]));
  const kept = Object.entries(values).filter(([key]) => !(key in riskFindings));
  return { ...Object.fromEntries(kept), findings } as unknown as RecordedRisk & Values;
}

/** The level by the criteria, unless somebody has chosen another. */
function withLevel(values: Values): Values {
  const risk = riskOf(values);
  if (!isJudgeable(risk)) return risk;
  const byCriteria = riskLevelOf(stratificationOf(risk), null);
  return { ...risk, level: values['level'] ?? byCriteria };
}

/** Each criterion there, not there, or not known; the class follows, and another is chosen only with a reason. */
export function riskForm(): EntryForm {
  const { shape } = recordValues['risk-stratifications'];
  return {
    heading: 'Stratify the risk',
    save: 'Save',
    saved: 'Risk saved.',
    rules: { ...shape, level: shape.level.nullable() },
    fields: [
      ...findingNames.map((name) => ({
        key: name,
        label: riskFindings[name].label,
        type: 'yes-no' as const,
      })),
      number('ejectionFraction', riskNumbers.ejectionFraction.label, '%'),
      number('capacity', riskNumbers.capacity.label, 'METs'),
      {
        key: 'level',
        label: 'Another class than by the criteria',
        type: 'choice',
        none: 'No, as the criteria say',
        options: options(
          riskLevels.filter((level) => level !== 'unknown'),
          riskWords,
        ),
      },
      {
        key: 'overrideReason',
        label: 'Reason for another class',
        type: 'text',
        optional: true,
      },
      date('assessedOn', 'Assessed on'),
      note,
    ],
    lines: (values) => riskLines(riskOf(values)),
    toEntries: (values, idOf) => [
      {
        kind: 'risk-stratifications',
        id: idOf(0),
        values: withLevel(values),
      } as NewRecordEntryInput,
    ],
    pathOf: () => '',
  };
}
