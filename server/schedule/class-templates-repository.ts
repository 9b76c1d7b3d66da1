import { and, asc, eq, sql } from 'drizzle-orm';
import type {
  ClassTemplate,
  ClassTemplateChange,
  ClassTemplates,
  NewClassTemplate,
} from '@shared/contracts/class-templates-contract';
import type { Transaction } from '../database/client';
import { classTemplates, priceItems } from '../database/schema';

type Row = typeof classTemplates.$inferSelect;

const present = ({ createdAt: _, localStart, ...row }: Row): ClassTemplate => ({
  ...row,
  localStart: localStart.slice(0, 5),
});

export async function findClassTemplate(
  tx: Transaction,
  id: string,
): Promise<ClassTemplate | null> {
  const [row] = await tx.select().from(classTemplates).where(eq(classTemplates.id, id));
  return row === undefined ? null : present(row);
}

/** A site's classes by the hour at which they start, then by name. */
export async function listClassTemplates(
  tx: Transaction,
  siteId: string,
): Promise<ClassTemplate[]> {
  const rows = await tx
    .select()
    .from(classTemplates)
    .where(eq(classTemplates.siteId, siteId))
    .orderBy(asc(classTemplates.localStart), asc(classTemplates.name), asc(classTemplates.id));
  return rows.map(present);
}

/** The prices that a class may have. */
export function listActivePrices(tx: Transaction): Promise<ClassTemplates['prices']> {
  const { id, name, amountMinor, currency, active } = priceItems;
  return tx
    .select({ id, name, amountMinor, currency })
    .from(priceItems)
    .where(eq(active, true))
    .orderBy(asc(name), asc(id));
}

export async function insertClassTemplate(
  tx: Transaction,
  id: string,
  given: NewClassTemplate,
): Promise<void> {
  await tx.insert(classTemplates).values({ ...given, id });
}

/** @returns false when someone changed it since the version that the change was made on */
export async function updateClassTemplate(
  tx: Transaction,
  id: string,
  { version, ...change }: ClassTemplateChange,
): Promise<boolean> {
  const { rowCount } = await tx
    .update(classTemplates)
    .set({ ...change, version: sql`${classTemplates.version} + 1` })
    .where(and(eq(classTemplates.id, id), eq(classTemplates.version, version)));
  return rowCount === 1;
}
