import type { CompletionReport, CompletionRow, Sharing } from '@shared/contracts/reports-contract';
import { discloseGroups, SMALLEST_CELL, type Disclosure } from '@shared/statistics/small-cells';

/** A spreadsheet would run a cell that begins so as a formula. */
const FORMULA = /^[=+\-@\t\r\n]/;

function cell(value: string | number | null): string {
  if (value === null) return '';
  if (typeof value === 'number') return String(value);
  const safe = FORMULA.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

const line = (values: readonly (string | number | null)[]): string => values.map(cell).join(',');

const HIDDEN = 'suppressed';

const KEPT_BACK =
  `For sharing outside: counts of 1 to ${SMALLEST_CELL - 1} people and what would give them away read "${HIDDEN}" ` +
  '(common practice, after the cell size suppression of US Medicare data). ' +
  'A second file of overlapping dates or filters could be subtracted from this one: share one.';

/** A row's cells, with what may not be told kept back; a count whose total is 0 is 0 in every row. */
function cellsOf(row: CompletionRow, disclosure: Disclosure, total: CompletionRow) {
  const told = disclosure === 'all';
  const part = (count: number, ofAll: number) => (told || ofAll === 0 ? count : HIDDEN);
  const derived = <T>(value: T) => (told ? value : HIDDEN);
  return [
    row.label,
    disclosure === 'nothing' ? HIDDEN : row.enrolled,
    part(row.completed, total.completed),
    part(row.ongoing, total.ongoing),
    derived(row.rate),
    derived(row.low),
    derived(row.high),
    derived(row.meanSessions),
    derived(row.rateAtMost),
  ];
}

/**
 * The report as RFC 4180 text, headed by its definition, its dates and how ripe it is; for sharing outside without what would tell
 * of a few people.
 */
export function completionCsv(
  report: CompletionReport,
  { from, to, sharing }: { readonly from: string; readonly to: string; readonly sharing: Sharing },
): string {
  const { items, total } = report;
  const disclosed = sharing === 'outside' ? discloseGroups(items) : null;
  const ripe = report.final
    ? 'Every course here is closed or past its window.'
    : 'Some courses are still open: rates may rise to the last column.';
  const rows = items.map((row, each) => cellsOf(row, disclosed?.rows[each] ?? 'all', total));
  const sums = cellsOf(total, disclosed?.total ?? 'all', total);
  return [
    line([report.definition.text]),
    line([`First sessions from ${from} to before ${to}. As of ${report.asOf}. ${ripe}`]),
    ...(disclosed ? [line([KEPT_BACK])] : []),
    'Group,Started,Completed,Ongoing,Rate,95 % low,95 % high,Mean sessions,Rate at most',
    ...[...rows, sums].map(line),
    '',
  ].join('\r\n');
}
