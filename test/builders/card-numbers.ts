import type { PaymentHouse } from './payment-house';

/** As they are stored, or as people write them in fours. */
const long = /(?<![\w.-])\d{13,19}(?![\w-])|\b\d{4}([ -])\d{4}\1\d{4}\1\d{4}\b/g;

/** The check digit of ISO/IEC 7812-1, the Luhn formula. */
function passesLuhn(digits: string): boolean {
  const sum = [...digits].reverse().reduce((total, digit, at) => {
    const doubled = Number(digit) * (at % 2 === 1 ? 2 : 1);
    return total + (doubled > 9 ? doubled - 9 : doubled);
  }, 0);
  return sum % 10 === 0;
}

/** What reads as the number of a card, in any table and any line of the log. */
export async function cardNumbersIn({ query, testApp }: PaymentHouse): Promise<string[]> {
  const tables = await query<{ name: string }>(
    `SELECT format('%I.%I', schemaname, tablename) AS name FROM pg_tables WHERE schemaname IN ('public', 'graphile_worker')`,
  );
  const kept = await Promise.all(
    tables.map(({ name }) => query<{ row: string }>(`SELECT t::text AS row FROM ${name} t`)),
  );
  const everything = `${JSON.stringify(kept)}${JSON.stringify(testApp.logged())}`;
  const found = everything.match(long) ?? [];
  return found.filter((number) => passesLuhn(number.replaceAll(/\D/g, '')));
}
