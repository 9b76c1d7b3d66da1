import type {
  CompletionDefinition,
  CompletionGrouping,
  CompletionPatient,
  CompletionReport,
  CompletionRow,
} from '@shared/contracts/reports-contract';
import { wilsonInterval } from '@shared/statistics/wilson-interval';
import type { CompletionCounts, CourseRow } from './completion-queries';
import { STANDARD_COURSE, WINDOW_DAYS } from './completion-sql';
import { groupLabel } from './group-labels';

const WEEKS = WINDOW_DAYS / 7;

const TEXTS: Readonly<Record<CompletionDefinition, string>> = {
  A: `Of those who started: ${STANDARD_COURSE} sessions attended within ${WEEKS} weeks of the first.`,
  B: `Of those who started: all planned sessions attended within ${WEEKS} weeks of the first.`,
};

const definitionOf = (name: CompletionDefinition) => ({
  name,
  plannedDefault: STANDARD_COURSE,
  withinWeeks: WEEKS,
  text: TEXTS[name],
});

const NOBODY = { rate: null, low: null, high: null, rateAtMost: null, meanSessions: null };

/** What a row derives from its counts. */
function rates({ enrolled, completed, ongoing, sessions }: CompletionCounts) {
  if (enrolled === 0) return NOBODY;
  const { proportion, lower, upper } = wilsonInterval(completed, enrolled);
  return {
    rate: proportion,
    low: lower,
    high: upper,
    rateAtMost: (completed + ongoing) / enrolled,
    meanSessions: sessions / enrolled,
  };
}

function rowOf(counts: CompletionCounts, groupBy: CompletionGrouping): CompletionRow {
  const { enrolled, completed, ongoing } = counts;
  const group = counts.group ?? 'all';
  const label = counts.group === null ? 'All' : groupLabel(groupBy, group, counts.name);
  return { group, label, enrolled, completed, ongoing, ...rates(counts) };
}

interface Counted {
  readonly definition: CompletionDefinition;
  readonly groupBy: CompletionGrouping;
  readonly now: Date;
}

/** The report as it is shown: counts with their rates, and how ripe they are. */
export function completionReport(
  counts: readonly CompletionCounts[],
  { definition, groupBy, now }: Counted,
): CompletionReport {
  const none = { group: null, name: null, enrolled: 0, completed: 0, ongoing: 0, sessions: 0 };
  const total = counts.find(({ group }) => group === null) ?? none;
  const groups = counts.filter(({ group }) => group !== null);
  // Grouped by nothing there is one row, also when nobody started.
  const shown = groupBy === 'none' ? [{ ...total, group: 'all' }] : groups;
  return {
    definition: definitionOf(definition),
    final: total.ongoing === 0,
    asOf: now.toISOString(),
    total: rowOf(total, groupBy),
    items: shown.map((row) => rowOf(row, groupBy)),
  };
}

export const presentCourse = ({
  familyName,
  givenName,
  total: _,
  ...row
}: CourseRow): CompletionPatient => ({ ...row, displayName: `${givenName} ${familyName}` });
