import { randomUUID } from 'node:crypto';
import type { Database } from '../../server/database/client';
import { charges, priceItems } from '../../server/database/schema';

type NewPrice = typeof priceItems.$inferInsert;
type NewCharge = typeof charges.$inferInsert;

async function one<T>(rows: PromiseLike<T[]>): Promise<T> {
  const [row] = await rows;
  if (!row) throw new Error('A builder made no row');
  return row;
}

/** Twenty-five dollars a class unless told otherwise. */
export const buildPrice = (database: Database, given: Partial<NewPrice> = {}) =>
  one(
    database
      .insert(priceItems)
      .values({
        name: `Maintenance class ${randomUUID().slice(0, 8)}`,
        amountMinor: 2500,
        currency: 'USD',
        ...given,
      })
      .returning(),
  );

/** An open charge of twenty-five dollars for no class in particular, without its ledger. */
export async function buildCharge(
  database: Database,
  given: Partial<NewCharge> & { readonly patientId: string },
) {
  const priceItemId = given.priceItemId ?? (await buildPrice(database)).id;
  return one(
    database
      .insert(charges)
      .values({ amountMinor: 2500, currency: 'USD', ...given, priceItemId })
      .returning(),
  );
}
