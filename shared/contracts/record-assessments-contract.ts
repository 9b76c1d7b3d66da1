import * as z from 'zod';
import { riskLevels } from '../clinical/prescribing/request';
import { questionnaires } from '../clinical/questionnaires/questionnaires';
import { riskFindings, type RiskFinding } from '../clinical/risk/criteria';
import { whyNotRecordedRisk } from '../clinical/risk/recorded-risk';
import { localDateField, noteField, numberField, textField } from './fields';

// What was asked and judged.

const optional = <T extends z.ZodType>(field: T) => field.nullable().default(null);

export type QuestionnaireKey = keyof typeof questionnaires;
export const instruments = Object.keys(questionnaires) as [QuestionnaireKey, ...QuestionnaireKey[]];

const isAnswerOf = (instrument: QuestionnaireKey, answer: number | boolean | null): boolean =>
  answer === null || questionnaires[instrument].answers.some(({ value }) => value === answer);

/** A questionnaire's answers in its order, null for one not answered; scores are computed, never stored. */
export const questionnaire = z
  .strictObject({
    instrument: z.enum(instruments, 'Choose the questionnaire'),
    answers: z.array(z.union([z.number(), z.boolean()]).nullable()).max(12),
    answeredOn: localDateField,
  })
  .superRefine(({ instrument, answers }, context) => {
    const refuse = (path: (string | number)[], message: string) =>
      context.addIssue({ code: 'custom', path, message });
    const { items } = questionnaires[instrument];
    if (answers.length !== items.length) {
      return refuse(['answers'], `This questionnaire has ${items.length} questions`);
    }
    if (answers.every((answer) => answer === null))
      refuse(['answers'], 'Enter at least one answer');
    answers.forEach((answer, index) => {
      if (!isAnswerOf(instrument, answer)) {
        refuse(['answers', index], 'Choose one of the answers to this question');
      }
    });
  });

const finding = z.boolean().nullable().default(null);
const findingNames = Object.keys(riskFindings) as RiskFinding[];
const findings = z.strictObject(
  Object.fromEntries(findingNames.map((name) => [name, finding])) as Record<
    RiskFinding,
    typeof finding
  >,
);

/** The criteria, each there, not there or missing (null), and the level to work by. */
export const riskStratification = z
  .strictObject({
    findings: findings.default(findings.parse({})),
    ejectionFraction: optional(numberField({ lowest: 5, highest: 90 }, '%')),
    capacity: optional(numberField({ lowest: 1, highest: 25 }, 'METs')),
    level: z.enum(riskLevels, 'Choose the risk'),
    /** Why the level is another than the criteria give. */
    overrideReason: optional(textField(300, 'Give the reason for another class')),
    assessedOn: localDateField,
    note: noteField(1000).nullable().default(null),
  })
  .superRefine((risk, context) => {
    const why = whyNotRecordedRisk(risk);
    if (why !== null) context.addIssue({ code: 'custom', path: [why.path], message: why.message });
  });
