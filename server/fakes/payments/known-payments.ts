import { readFile } from 'node:fs/promises';
import * as z from 'zod';

const knownPayment = z.strictObject({
  id: z.string().regex(/^pi_\w+$/),
  amount: z.int().positive(),
  currency: z.string().length(3).toLowerCase(),
  metadata: z.record(z.string(), z.string()),
});

/** A payment that was made elsewhere, as by the story of a demonstration, and that the stand-in is to know. */
export type KnownPayment = z.infer<typeof knownPayment>;

/** @throws Error when the file is not a list of payments; one that is not there holds none */
export async function readKnownPayments(path: string): Promise<KnownPayment[]> {
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return [];
    throw error;
  }
  return z.array(knownPayment).parse(JSON.parse(text));
}
