import type { ConditionKind } from '@shared/contracts/record-lists';
import { conditionKinds } from '@shared/contracts/record-lists';
import type { DiagnosisKind } from '@shared/contracts/patients-contract';
import type { InputOrigin, PrefilledInputs } from '@shared/contracts/prescribing-inputs-contract';
import { nothingEntered, type RecordFacts } from './record-facts';

type Conditions = PrefilledInputs['conditions'];

interface DerivedConditions {
  readonly value: Conditions;
  readonly origins: Readonly<Record<string, InputOrigin>>;
  readonly missing: readonly string[];
}

interface Answer {
  readonly value: string | null;
  readonly origin: InputOrigin;
}

/** What a diagnosis answers by itself where nobody answered: never that a condition is absent. */
const fromDiagnosis: Readonly<Partial<Record<DiagnosisKind, readonly [ConditionKind, string]>>> = {
  'heart-attack': ['coronaryDisease', 'yes'],
  stent: ['coronaryDisease', 'yes'],
  bypass: ['coronaryDisease', 'yes'],
  'stable-angina': ['coronaryDisease', 'yes'],
  'heart-failure': ['heartFailure', 'unknown'],
  transplant: ['transplant', 'denervated'],
  'assist-device': ['ventricularAssistDevice', 'yes'],
};

function answerOf(facts: RecordFacts, kind: ConditionKind): Answer {
  const entry = facts.record.conditions.find(({ values }) => values.kind === kind);
  if (entry) {
    const origin = {
      text: `Entered by ${entry.recordedBy.displayName}`,
      date: entry.recordedAt.slice(0, 10),
      old: false,
      entryId: entry.id,
    };
    return { value: entry.values.value, origin };
  }
  const implied = impliedBy(facts, kind);
  return implied ?? { value: null, origin: nothingEntered('Nobody has answered this yet') };
}

function impliedBy({ record, course }: RecordFacts, kind: ConditionKind): Answer | null {
  const entered = record.diagnoses.map(({ id, values }) => ({ diagnosis: values.kind, id }));
  const all = course ? [...entered, { diagnosis: course.qualifyingDiagnosis, id: null }] : entered;
  for (const { diagnosis, id } of all) {
    const implied = fromDiagnosis[diagnosis];
    if (implied?.[0] !== kind) continue;
    const text = `Follows from the diagnosis: ${diagnosis.replaceAll('-', ' ')}`;
    return { value: implied[1], origin: { text, date: null, old: false, entryId: id } };
  }
  return null;
}

const yes = ({ value }: Answer): boolean | null => (value === null ? null : value === 'yes');

/** The latest answer to each; a yes-or-no that nobody answered is missing, never taken for no. */
export function conditionsOf(facts: RecordFacts): DerivedConditions {
  const answers = Object.fromEntries(
    conditionKinds.map((kind) => [kind, answerOf(facts, kind)]),
  ) as Record<ConditionKind, Answer>;
  const value: Conditions = {
    coronaryDisease: yes(answers.coronaryDisease),
    heartFailure: (answers.heartFailure.value ?? 'unknown') as Conditions['heartFailure'],
    transplant: answers.transplant.value as Conditions['transplant'],
    ventricularAssistDevice: yes(answers.ventricularAssistDevice),
    chronotropicIncompetence: yes(answers.chronotropicIncompetence),
    autonomicNeuropathy: yes(answers.autonomicNeuropathy),
    pulmonaryHypertension: yes(answers.pulmonaryHypertension),
    dissection: yes(answers.dissection),
    peripheralArteryDisease: yes(answers.peripheralArteryDisease),
    outflowObstruction: yes(answers.outflowObstruction),
  };
  return {
    value,
    origins: Object.fromEntries(
      conditionKinds.map((kind) => [`conditions.${kind}`, answers[kind].origin]),
    ),
    missing: conditionKinds
      .filter((kind) => value[kind] === null)
      .map((kind) => `conditions.${kind}`),
  };
}
