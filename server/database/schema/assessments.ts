import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  date,
  index,
  jsonb,
  pgEnum,
  pgTable,
  real,
  text,
} from 'drizzle-orm/pg-core';
import type { RiskFinding } from '@shared/clinical/risk/criteria';
import type { QuestionnaireKey } from '@shared/contracts/record-assessments-contract';
import type { RecordValues } from '@shared/contracts/record-contract';
import { id } from './columns';
import { attribution, endedWhole, ending, ofPatient } from './record-entry';

type QuestionnaireValues = RecordValues<'questionnaires'>;

export const riskLevel = pgEnum('risk_level', ['low', 'moderate', 'high', 'unknown']);

export const riskStratifications = pgTable(
  'risk_stratifications',
  {
    id: id(),
    patientId: ofPatient(),
    level: riskLevel().notNull(),
    /** Each criterion there, not there or missing (null). */
    findings: jsonb().$type<Partial<Record<RiskFinding, boolean | null>>>().notNull().default({}),
    ejectionFraction: real(),
    capacity: real(),
    overrideReason: text(),
    assessedOn: date({ mode: 'string' }).notNull(),
    note: text(),
    ...attribution(),
  },
  (t) => [
    index('risk_stratifications_patient').on(t.patientId, t.assessedOn),
    check('risk_stratifications_ejection', sql`${t.ejectionFraction} between 5 and 90`),
    check('risk_stratifications_capacity', sql`${t.capacity} between 1 and 25`),
    // What is missing never counts as low, nor does a person's word make it so.
    check(
      'risk_stratifications_low_is_whole',
      sql`${t.level} <> 'low' or (jsonb_array_length(jsonb_path_query_array(${t.findings}, '$.* ? (@ != null)')) = 14 and ${t.ejectionFraction} is not null and ${t.capacity} is not null)`,
    ),
  ],
);

/** Answers as given; scores are computed from them. A PHQ-9 whose ninth item is above zero waits for a person. */
export const questionnaireAnswers = pgTable(
  'questionnaire_answers',
  {
    id: id(),
    patientId: ofPatient(),
    instrument: text().$type<QuestionnaireKey>().notNull(),
    answers: jsonb().$type<QuestionnaireValues['answers']>().notNull(),
    answeredOn: date({ mode: 'string' }).notNull(),
    /** Thoughts of self-harm were told: someone speaks with the patient the same day. */
    selfHarm: boolean()
      .notNull()
      .generatedAlwaysAs(
        sql`instrument = 'phq-9' and coalesce(answers ->> 8, '0') in ('1', '2', '3')`,
      ),
    ...ending(),
    ...attribution(),
  },
  (t) => [
    index('questionnaire_answers_patient').on(t.patientId, t.answeredOn),
    index('questionnaire_answers_follow_up')
      .on(t.recordedAt)
      .where(sql`self_harm and ended_at is null and entered_in_error_at is null`),
    check(
      'questionnaire_answers_length',
      sql`jsonb_array_length(${t.answers}) = case ${t.instrument} when 'phq-2' then 2 when 'phq-9' then 9 when 'gad-7' then 7 when 'dasi' then 12 else -1 end`,
    ),
    check('questionnaire_answers_closed_by_someone', endedWhole(t)),
    check('questionnaire_answers_closed_follow_up', sql`${t.endedAt} is null or ${t.selfHarm}`),
  ],
);
