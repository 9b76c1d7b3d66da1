import { eq, sql } from 'drizzle-orm';
import {
  completionDefinitions,
  type CompletionDefinition,
} from '@shared/contracts/reports-contract';
import type { Queryable } from '../database/client';
import { programSettings } from '../database/schema';

const KEY = 'completion-definition';
const STANDARD: CompletionDefinition = 'B';

/** How the program defines completion; B, planned sessions attended, until somebody chose otherwise. */
export async function readCompletionDefinition(tx: Queryable): Promise<CompletionDefinition> {
  const [row] = await tx
    .select({ value: programSettings.value })
    .from(programSettings)
    .where(eq(programSettings.key, KEY));
  return completionDefinitions.find((each) => each === row?.value) ?? STANDARD;
}

export async function writeCompletionDefinition(
  tx: Queryable,
  change: { readonly value: CompletionDefinition; readonly changedBy: string; readonly now: Date },
): Promise<void> {
  const { value, changedBy, now: changedAt } = change;
  await tx
    .insert(programSettings)
    .values({ key: KEY, value, changedBy, changedAt })
    .onConflictDoUpdate({
      target: programSettings.key,
      set: { value, changedBy, changedAt, version: sql`${programSettings.version} + 1` },
    });
}
