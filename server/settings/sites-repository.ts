import { asc } from 'drizzle-orm';
import type { NewSite, Site, SiteDetails } from '@shared/contracts/sites-contract';
import type { Queryable, Transaction } from '../database/client';
import { sites } from '../database/schema';

const site = { id: sites.id, name: sites.name, timeZone: sites.timeZone };

export const listSites = (db: Queryable): Promise<Site[]> =>
  db.select(site).from(sites).orderBy(asc(sites.name));

export const listSiteDetails = (db: Queryable): Promise<SiteDetails[]> =>
  db
    .select({ ...site, address: sites.address, phone: sites.phone })
    .from(sites)
    .orderBy(asc(sites.name));

/** @throws on constraint `sites_name_unique` */
export async function insertSite(tx: Transaction, given: NewSite): Promise<Site> {
  const [made] = await tx.insert(sites).values(given).returning(site);
  if (!made) throw new Error('A site was not made');
  return made;
}
