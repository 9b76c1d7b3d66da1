import * as z from 'zod';
import { inject } from 'vitest';

const caught = z.object({ items: z.array(z.object({ subject: z.string() })) });

/** Subjects of the e-mails that an address was really sent so far, newest first. */
async function subjectsTo(address: string): Promise<string[]> {
  const url = new URL('/api/messages', inject('product').mailUrl);
  url.searchParams.set('to', address);
  const { items } = caught.parse(await (await fetch(url)).json());
  return items.map(({ subject }) => subject);
}

/** Tells, whenever it is called, the subjects of what an address was sent since now. */
export async function mailsFromNow(address: string): Promise<() => Promise<string[]>> {
  const before = (await subjectsTo(address)).length;
  return async () => (await subjectsTo(address)).reverse().slice(before);
}
