import type { Minutes } from '../../units';
import type { PrescriptionAnswer } from '../prescribing/answer';
import { isSameSetting } from './machine-setting';
import { armLimit } from './most-work';
import type { ProgressionPolicy } from './progression-policy';
import { targetFor } from './read-session';
import type { SessionReport } from './read-session';
import type { ProgressionReasonCode } from './reasons';
import type { SessionFacts } from './session-facts';

/** The last sessions, newest first, each with what it says. */
export interface LastSessions {
  readonly sessions: readonly SessionFacts[];
  readonly reports: readonly SessionReport[];
  readonly prescription: PrescriptionAnswer;
}

export type Readiness =
  | { readonly step: 'none'; readonly code: ProgressionReasonCode }
  | { readonly step: 'harder'; readonly code: ProgressionReasonCode }
  | { readonly step: 'longer'; readonly code: ProgressionReasonCode; readonly minutes: Minutes };

const isClean = ({ alarms, troubles, holds }: SessionReport): boolean =>
  alarms.length + troubles.length + holds.length === 0;

/** Days between two sessions that follow one another, the longest. */
const longestGap = (sessions: readonly SessionFacts[]): number =>
  Math.max(
    0,
    ...sessions
      .slice(1)
      .map(({ daysAgo }, index) => daysAgo - (sessions[index]?.daysAgo ?? daysAgo)),
  );

/** Why the last sessions do not count together; null when they do. */
function whyNotYet(
  { sessions, reports, prescription }: LastSessions,
  policy: ProgressionPolicy,
): ProgressionReasonCode | null {
  const last = sessions.slice(0, policy.sessionsNeeded);
  const [newest] = last;
  const setting = newest?.setting ?? null;
  if (prescription.cautions.some(({ code }) => code === 'work-ceiling-unknown')) {
    return 'work-ceiling-unknown';
  }
  if (setting === null) return 'not-recorded';
  if (setting.modality === 'arm' && armLimit(prescription) === null) return 'arm-limit-unknown';
  if (last.some(({ underThisPrescription }) => !underThisPrescription)) return 'new-prescription';
  if (last.length < policy.sessionsNeeded) return 'few-sessions';
  if (
    last.some((session) => session.setting === null || !isSameSetting(session.setting, setting))
  ) {
    return 'work-changed';
  }
  // The session before the counted ones tells of an absence too.
  if (longestGap(sessions.slice(0, policy.sessionsNeeded + 1)) > policy.absenceDays) {
    return 'after-absence';
  }
  return reports.slice(0, policy.sessionsNeeded).every(isClean) ? null : 'earlier-trouble';
}

/** Whether every session had effort, and rate where it counts, to spare. */
function hasRoom(
  { sessions, reports, prescription }: LastSessions,
  { sessionsNeeded, effortRoom, rateRoom }: ProgressionPolicy,
): boolean {
  const { perceivedExertion, ceiling, askLine } = prescription;
  return reports.slice(0, sessionsNeeded).every(({ highestEffort, highestRate }, index) => {
    const session = sessions[index];
    if (highestEffort === null || session === undefined) return false;
    const upper = targetFor(session, prescription)?.upper;
    const most = Math.min(upper ?? Infinity, ceiling?.value ?? Infinity, askLine ?? Infinity);
    const isRateFree =
      most === Infinity || (highestRate !== null && highestRate <= most - rateRoom);
    return isRateFree && highestEffort <= perceivedExertion.upper - effortRoom;
  });
}

/** Whether the rate stayed below the range in every session; never with bouts too short to read. */
const isBelow = (
  { sessions, reports, prescription }: LastSessions,
  { sessionsNeeded }: ProgressionPolicy,
): boolean =>
  sessions.slice(0, sessionsNeeded).every((session, index) => {
    const target = targetFor(session, prescription);
    const rate = reports[index]?.medianRate ?? null;
    return target !== null && rate !== null && rate < target.lower;
  });

/** What several clean sessions at the same work lead to. */
export function readyFor(last: LastSessions, policy: ProgressionPolicy): Readiness {
  const notYet = whyNotYet(last, policy);
  if (notYet !== null) return { step: 'none', code: notYet };
  const room = hasRoom(last, policy);
  if (isBelow(last, policy)) {
    return room
      ? { step: 'harder', code: 'below-range' }
      : { step: 'none', code: 'rate-and-effort-disagree' };
  }
  const minutes = last.sessions[0]?.minutes ?? null;
  if (minutes === null) return { step: 'none', code: 'not-recorded' };
  if (minutes < policy.goalMinutes) return { step: 'longer', code: 'duration-first', minutes };
  return room ? { step: 'harder', code: 'easy-in-range' } : { step: 'none', code: 'in-range' };
}
