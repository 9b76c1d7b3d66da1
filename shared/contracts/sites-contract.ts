import * as z from 'zod';
import { textField } from './fields';
import './zod';

/** `GET /api/sites` */
export const siteSchema = z.object({
  id: z.uuid(),
  name: z.string(),
  /** IANA zone. */
  timeZone: z.string(),
});
export type Site = z.infer<typeof siteSchema>;

export const sitesResponseSchema = z.object({ items: z.array(siteSchema) });

const isTimeZone = (name: string): boolean => {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return name.includes('/') || name === 'UTC';
  } catch {
    return false;
  }
};

const siteFields = {
  name: textField(120, 'Enter a name'),
  timeZone: z.string().refine(isTimeZone, 'Choose a time zone like America/New_York'),
  address: textField(300, 'Enter an address'),
  phone: textField(40, 'Enter a telephone number'),
};

/** `POST /api/sites` */
export const newSiteSchema = z.strictObject(siteFields);
export type NewSite = z.infer<typeof newSiteSchema>;

/** `PUT /api/sites/:id`: `version` as it was read; another zone moves the classes to come to the same time on its clock. */
export const siteChangeSchema = z.strictObject({ ...siteFields, version: z.int().min(1) });
export type SiteChange = z.infer<typeof siteChangeSchema>;

/** A site with where it is and how to call it. */
export const siteDetailsSchema = siteSchema.extend({
  address: z.string(),
  phone: z.string(),
  version: z.int(),
});
export type SiteDetails = z.infer<typeof siteDetailsSchema>;

/** What a change of a site did. */
export const changedSiteSchema = z.object({
  site: siteDetailsSchema,
  /** Class dates to come that begin at another instant now. */
  movedClassDates: z.int(),
});
export type ChangedSite = z.infer<typeof changedSiteSchema>;

export const sitesDetailsResponseSchema = z.object({ items: z.array(siteDetailsSchema) });
