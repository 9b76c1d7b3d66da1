import { v7 as uuidv7 } from 'uuid';
import type { Transaction } from '../database/client';
import { ledgerEntries } from '../database/schema';

type Account = (typeof ledgerEntries.$inferInsert)['account'];

export interface Posting {
  /** What it tells of, as `charge:<id>`; a key is posted once, ever. */
  readonly key: string;
  readonly chargeId: string;
  readonly debit: Account;
  readonly credit: Account;
  /** Above zero. */
  readonly amountMinor: number;
  readonly currency: string;
  readonly at: Date;
}

/** Writes both sides of a posting, unless they stand already. */
export async function post(tx: Transaction, posting: Posting): Promise<void> {
  const { key: postingKey, chargeId, debit, credit, amountMinor, currency, at } = posting;
  const shared = { journalId: uuidv7(), postingKey, chargeId, currency, at };
  await tx
    .insert(ledgerEntries)
    .values([
      { ...shared, account: debit, debitMinor: amountMinor },
      { ...shared, account: credit, creditMinor: amountMinor },
    ])
    .onConflictDoNothing();
}
