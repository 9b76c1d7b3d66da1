import type { Minutes, Mets } from '../../units';
import { mets, minutes, toMillionths } from '../../units';
import type { PrescriptionAnswer } from '../prescribing/answer';
import type { MachineFacts, MachineSetting } from './machine-setting';
import { metsOfSetting, settingUpTo } from './machine-setting';
import { mostWork } from './most-work';
import type { ProgressionPolicy } from './progression-policy';
import { readSession } from './read-session';
import type { SessionReport } from './read-session';
import type { Readiness } from './ready-for-more';
import { readyFor } from './ready-for-more';
import type { ProgressionReasonCode } from './reasons';
import { progressionReasons } from './reasons';
import type { SessionFacts } from './session-facts';

export const progressionActions = ['hold', 'longer', 'harder', 'easier', 'review'] as const;
export type ProgressionAction = (typeof progressionActions)[number];

export interface ProgressionFacts extends MachineFacts {
  /** Signed sessions on one machine, the newest first. */
  readonly sessions: readonly SessionFacts[];
  /** The prescription in force. */
  readonly prescription: PrescriptionAnswer;
  /** Whether its range was withdrawn. */
  readonly withdrawn: boolean;
}

/** Work on a machine for a time. */
export interface Load {
  readonly setting: MachineSetting;
  /** Null where the equation does not reach. */
  readonly mets: Mets | null;
  readonly minutes: Minutes | null;
}

export interface ProgressionReason {
  readonly code: ProgressionReasonCode;
  readonly text: string;
  readonly source: string;
}

/** What is proposed after a session; a person accepts, edits or dismisses it. */
export interface ProgressionProposal {
  readonly action: ProgressionAction;
  readonly reasons: readonly ProgressionReason[];
  /** The last session's load; null when its setting is not recorded. */
  readonly from: Load | null;
  /** What to set next; with a review, what to work at until then. Null: leave it, or set it by effort. */
  readonly to: Load | null;
}

const proposal = (
  action: ProgressionAction,
  codes: readonly ProgressionReasonCode[],
  from: Load | null,
  to: Load | null = null,
): ProgressionProposal => ({
  action,
  reasons: [...new Set(codes)].map((code) => {
    const [text, source] = progressionReasons[code];
    return { code, text, source };
  }),
  from,
  to,
});

function loadOf(session: SessionFacts, { weight }: ProgressionFacts): Load | null {
  const { setting, minutes: time } = session;
  return setting && { setting, mets: metsOfSetting(setting, weight), minutes: time };
}

/** The load one step easier and under every ceiling; null where it cannot be told. */
function easierLoad(
  from: Load | null,
  facts: ProgressionFacts,
  policy: ProgressionPolicy,
): Load | null {
  if (from === null || from.mets === null) return null;
  const work = Math.min(from.mets - policy.easierStep, mostWork(from.setting, facts.prescription));
  const found = settingUpTo(from.setting, mets(work), facts);
  return found && { ...found, minutes: from.minutes };
}

function easier(
  codes: readonly ProgressionReasonCode[],
  from: Load | null,
  facts: ProgressionFacts,
  policy: ProgressionPolicy,
): ProgressionProposal {
  const to = easierLoad(from, facts, policy);
  if (to !== null) return proposal('easier', codes, from, to);
  return from === null || from.mets === null
    ? proposal('easier', [...codes, 'equation-range'], from)
    : proposal('review', [...codes, 'lowest-setting'], from);
}

function harder(
  code: ProgressionReasonCode,
  from: Load,
  facts: ProgressionFacts,
  policy: ProgressionPolicy,
): ProgressionProposal {
  if (from.mets === null) return proposal('hold', ['equation-range'], from);
  const step = Math.min(policy.metsStep, policy.mostIncrease * from.mets);
  const limit = mostWork(from.setting, facts.prescription);
  if (toMillionths(limit - from.mets) <= 0) return proposal('hold', ['at-limit'], from);
  const found = settingUpTo(from.setting, mets(Math.min(from.mets + step, limit)), facts);
  const isMore = found !== null && toMillionths(found.mets - from.mets) > 0;
  return isMore
    ? proposal('harder', [code], from, { ...found, minutes: from.minutes })
    : proposal('hold', ['no-room'], from);
}

/** What the work itself says, whatever the readings. */
function workSays(
  from: Load | null,
  prescription: PrescriptionAnswer,
): 'over-work-ceiling' | 'over-work-target' | 'equation-range' | null {
  const limit = from === null ? Infinity : mostWork(from.setting, prescription);
  if (from === null || limit === Infinity) return null;
  if (from.mets === null) return 'equation-range';
  if (toMillionths(from.mets - limit) <= 0) return null;
  const { workCeilingMets } = prescription;
  const isOverCeiling = workCeilingMets !== null && toMillionths(from.mets - workCeilingMets) > 0;
  return isOverCeiling ? 'over-work-ceiling' : 'over-work-target';
}

/** Whether the newest session's trouble came in as many sessions as the policy says. */
function isRepeated(reports: readonly SessionReport[], policy: ProgressionPolicy): boolean {
  const [newest] = reports;
  const last = reports.slice(0, policy.repeatedSessions);
  if (newest === undefined || last.length < policy.repeatedSessions) return false;
  const codes = [...newest.troubles, ...newest.holds.filter((code) => code === 'minor-symptom')];
  return codes.some((code) =>
    last.every(({ troubles, holds }) => troubles.includes(code) || holds.includes(code)),
  );
}

function beforeAnySession({ withdrawn, prescription }: ProgressionFacts): ProgressionReasonCode[] {
  if (withdrawn) return ['withdrawn'];
  return prescription.cautions.some(({ severity }) => severity === 'stop') ? ['stop-caution'] : [];
}

/** Longer or harder, where the last sessions lead to it. */
function more(
  from: Load | null,
  ready: Readiness,
  facts: ProgressionFacts,
  policy: ProgressionPolicy,
): ProgressionProposal {
  if (from === null || ready.step === 'none') return proposal('hold', [ready.code], from);
  if (ready.step === 'harder') return harder(ready.code, from, facts, policy);
  const time = Math.min(policy.goalMinutes, ready.minutes + policy.minutesStep);
  return proposal('longer', [ready.code], from, { ...from, minutes: minutes(time) });
}

/**
 * The next step after a signed session. Safety comes first: what withdraws or stops, then a passed limit or a symptom (review), then
 * too much work, rate or effort (easier), then all that leaves a doubt (hold); only several clean sessions at the same work lead to
 * longer, and long enough ones to harder. Never above the work ceiling, the prescribed work or the equation's range; what was not
 * recorded never raises anything.
 */
export function proposeProgression(
  facts: ProgressionFacts,
  policy: ProgressionPolicy,
): ProgressionProposal {
  const { sessions, prescription } = facts;
  const [newest] = sessions;
  const from = newest === undefined ? null : loadOf(newest, facts);
  const blocked = beforeAnySession(facts);
  if (blocked.length > 0) return proposal('review', blocked, from);
  const reports = sessions.map((session) => readSession(session, prescription, policy));
  const [report] = reports;
  if (newest === undefined || report === undefined) return proposal('hold', ['no-session'], null);
  if (report.alarms.length > 0) {
    return proposal('review', report.alarms, from, easierLoad(from, facts, policy));
  }
  if (isRepeated(reports, policy)) {
    const codes = [...report.troubles, ...report.holds, 'repeated-trouble' as const];
    return proposal('review', codes, from, easierLoad(from, facts, policy));
  }
  const work = workSays(from, prescription);
  const tooMuch = [
    ...(work === null || work === 'equation-range' ? [] : [work]),
    ...report.troubles,
  ];
  if (tooMuch.length > 0) return easier(tooMuch, from, facts, policy);
  if (report.holds.length > 0) return proposal('hold', report.holds, from);
  if (work === 'equation-range') return proposal('hold', ['equation-range'], from);
  return more(from, readyFor({ sessions, reports, prescription }, policy), facts, policy);
}
