import { eq } from 'drizzle-orm';
import type { NewSite, Site, SiteChange, SiteDetails } from '@shared/contracts/sites-contract';
import type { Transaction } from '../database/client';
import { sites } from '../database/schema';
import { siteColumns, siteDetailColumns } from './sites-queries';

/** @throws on constraint `sites_name_unique` */
export async function insertSite(tx: Transaction, given: NewSite): Promise<Site> {
  const [made] = await tx.insert(sites).values(given).returning(siteColumns);
  if (!made) throw new Error('A site was not made');
  return made;
}

/** The site, locked as every planner of its classes locks it; undefined when there is none. */
export async function lockSite(tx: Transaction, id: string): Promise<SiteDetails | undefined> {
  const [row] = await tx
    .select(siteDetailColumns)
    .from(sites)
    .where(eq(sites.id, id))
    .for('no key update');
  return row;
}

/** @throws on constraint `sites_name_unique` */
export async function updateSite(
  tx: Transaction,
  id: string,
  { version, ...change }: SiteChange,
): Promise<SiteDetails> {
  const [row] = await tx
    .update(sites)
    .set({ ...change, version: version + 1 })
    .where(eq(sites.id, id))
    .returning(siteDetailColumns);
  if (!row) throw new Error('A site that was locked is gone');
  return row;
}
