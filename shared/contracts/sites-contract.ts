import * as z from 'zod';
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

/** `POST /api/sites` */
export const newSiteSchema = z.strictObject({
  name: z.string().trim().min(1, 'Enter a name').max(120),
  timeZone: z.string().refine(isTimeZone, 'Choose a time zone like America/New_York'),
  address: z.string().trim().min(1, 'Enter an address').max(300),
  phone: z.string().trim().min(1, 'Enter a telephone number').max(40),
});
export type NewSite = z.infer<typeof newSiteSchema>;

/** `GET /api/settings/sites`: the sites with where they are and how to call them. */
export const siteDetailsSchema = siteSchema.extend({ address: z.string(), phone: z.string() });
export type SiteDetails = z.infer<typeof siteDetailsSchema>;

export const sitesDetailsResponseSchema = z.object({ items: z.array(siteDetailsSchema) });
