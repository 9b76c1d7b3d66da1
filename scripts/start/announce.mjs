const PASSWORD = 'Harbor-Lane-36-steps';

const ACCOUNTS = [
  ['physiologist', 'Exercise physiologist'],
  ['nurse', 'Nurse'],
  ['physician', 'Physician, medical director'],
  ['frontdesk', 'Front desk'],
  ['director', 'Program director'],
  ['admin', 'Administrator'],
  ['patient', 'Patient'],
];

/** The demonstration's accounts, as a table. */
export function accountsTable() {
  const rows = [
    ['E-mail', 'Password', 'Role'],
    ...ACCOUNTS.map(([name, role]) => [`${name}@harborlane.example`, PASSWORD, role ?? '']),
  ];
  const widths = [0, 1].map((column) => Math.max(...rows.map((row) => row[column]?.length ?? 0)));
  const line = (/** @type {string[]} */ row) =>
    row.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join('  ');
  const [head = [], ...body] = rows;
  const rule = '-'.repeat(line(head).length + 20);
  return [line(head), rule, ...body.map(line)].join('\n');
}
