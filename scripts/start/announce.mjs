/**
 * The accounts that the server hands out, as its sign-in page shows them.
 * @param {number} port
 * @returns {Promise<{ label: string, email: string, password: string }[]>}
 */
async function demoAccounts(port) {
  const answer = await fetch(`http://127.0.0.1:${port}/api/auth/session`);
  return (await answer.json()).demoAccounts;
}

/**
 * The demonstration's accounts, as a table.
 * @param {number} port of the server, once it is ready
 */
export async function accountsTable(port) {
  const accounts = await demoAccounts(port);
  const rows = [
    ['E-mail', 'Password', 'Role'],
    ...accounts.map(({ email, password, label }) => [email, password, label]),
  ];
  const widths = [0, 1].map((column) => Math.max(...rows.map((row) => row[column]?.length ?? 0)));
  const line = (/** @type {string[]} */ row) =>
    row.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join('  ');
  const [head = [], ...body] = rows;
  const rule = '-'.repeat(line(head).length + 20);
  return [line(head), rule, ...body.map(line)].join('\n');
}
