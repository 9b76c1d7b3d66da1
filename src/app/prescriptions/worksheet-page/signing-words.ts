import { type PhysicianCause, physicianCauseWords } from '@shared/clinical/plan-limits';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing/answer';
import type { Worksheet } from '@shared/contracts/prescriptions-worksheet-contract';
import type { Question } from '../../ui/confirm/confirm';
import { formatDay, formatLocalDate } from '../../ui/words/dates';
import { rangeText } from '../../ui/words/prescription-words';

export interface Signing {
  readonly worksheet: Worksheet;
  readonly answer: PrescriptionAnswer;
  /** Whether the signer counts as a physician. */
  readonly asPhysician: boolean;
  readonly causes: readonly PhysicianCause[];
  /** How many inputs are not as in the record. */
  readonly tried: number;
}

export const causesText = (causes: readonly PhysicianCause[]): string =>
  causes.map((cause) => physicianCauseWords[cause]).join('; ');

function whatText({ target, ceiling, perceivedExertion, guide }: PrescriptionAnswer): string {
  const effort = `effort ${rangeText(perceivedExertion)}`;
  const lead = target
    ? `${rangeText(target)} bpm, ${effort}`
    : `Effort leads: ${rangeText(perceivedExertion)}${guide ? `, ${rangeText(guide)} bpm as a guide` : ''}`;
  return `${lead}, ${ceiling ? `ceiling ${ceiling.value} bpm` : 'no ceiling known'}.`;
}

function whoText({ asPhysician, causes }: Signing): string {
  if (asPhysician) return 'You sign as a physician: it enters into force at once.';
  if (causes.length === 0) return 'It enters into force at once.';
  return `It enters into force when a physician has signed too: ${causesText(causes)}.`;
}

/** What is asked before a signature: what will be in force, for whom, and who must still sign. */
export function signingQuestion(signing: Signing): Question {
  const { worksheet, answer, tried } = signing;
  const { patient, inForce } = worksheet;
  const zone = patient.site.timeZone;
  return {
    heading: 'Sign this range?',
    lines: [
      `${patient.displayName}, born ${formatLocalDate(patient.birthDate)}, ${patient.recordNumber}.`,
      whatText(answer),
      whoText(signing),
      ...(inForce
        ? [
            `It takes the place of the range in force since ${formatDay(inForce.activatedAt, zone)}.`,
          ]
        : []),
      ...(tried > 0
        ? [`${tried} ${tried === 1 ? 'input is' : 'inputs are'} not as in the record.`]
        : []),
      'A signed range never changes; a new one takes its place.',
    ],
    yes: 'Sign range',
    no: 'Not now',
  };
}
