import { asc } from 'drizzle-orm';
import type { Site, SiteDetails } from '@shared/contracts/sites-contract';
import type { Queryable } from '../database/client';
import { sites } from '../database/schema';

export const siteColumns = { id: sites.id, name: sites.name, timeZone: sites.timeZone };

export const siteDetailColumns = {
  ...siteColumns,
  address: sites.address,
  phone: sites.phone,
  version: sites.version,
};

export const listSites = (db: Queryable): Promise<Site[]> =>
  db.select(siteColumns).from(sites).orderBy(asc(sites.name));

export const listSiteDetails = (db: Queryable): Promise<SiteDetails[]> =>
  db.select(siteDetailColumns).from(sites).orderBy(asc(sites.name));
