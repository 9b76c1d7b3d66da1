import type { TestProject } from 'vitest/node';
import { startProduct } from '../../scripts/demonstration-product';

declare module 'vitest' {
  export interface ProvidedContext {
    /** Where the product and the caught mail of this run answer. */
    product: { url: string; mailUrl: string };
  }
}

/** The product of one run: started from nothing, with its demonstration, in a folder of its own. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const { url, mailUrl, stop } = await startProduct('e2e');
  project.provide('product', { url, mailUrl });
  return stop;
}
