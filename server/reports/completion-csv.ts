import type { CompletionReport } from '@shared/contracts/reports-contract';

/** A spreadsheet would run a cell that begins so as a formula. */
const FORMULA = /^[=+\-@\t\r\n]/;

function cell(value: string | number | null): string {
  if (value === null) return '';
  if (typeof value === 'number') return String(value);
  const safe = FORMULA.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

const line = (values: readonly (string | number | null)[]): string => values.map(cell).join(',');

/** The report as RFC 4180 text, headed by its definition, its dates and how ripe it is. */
export function completionCsv(
  report: CompletionReport,
  span: { readonly from: string; readonly to: string },
): string {
  const ripe = report.final
    ? 'Every course here is closed or past its window.'
    : 'Some courses are still open: rates may rise to the last column.';
  const rows = [...report.items, report.total].map((row) =>
    line([
      row.label,
      row.enrolled,
      row.completed,
      row.ongoing,
      row.rate,
      row.low,
      row.high,
      row.meanSessions,
      row.rateAtMost,
    ]),
  );
  return [
    line([report.definition.text]),
    line([`First sessions from ${span.from} to before ${span.to}. As of ${report.asOf}. ${ripe}`]),
    'Group,Started,Completed,Ongoing,Rate,95 % low,95 % high,Mean sessions,Rate at most',
    ...rows,
    '',
  ].join('\r\n');
}
