import { completionGroupings, type CompletionReport } from '@shared/contracts/reports-contract';
import type { Caller } from './caller';

const ROUNDS = 7;

const YEARS = 'from=2010-01-01&to=2030-01-01';

async function median(call: () => Promise<unknown>): Promise<number> {
  const times: number[] = [];
  for (let round = 0; round < ROUNDS; round += 1) {
    const begun = performance.now();
    await call();
    times.push(performance.now() - begun);
  }
  return times.sort((a, b) => a - b)[Math.floor(ROUNDS / 2)] ?? NaN;
}

/** Prints how long the completion report takes in each grouping, one call at a time. */
export async function timeCompletion(director: Caller): Promise<void> {
  const path = (groupBy: string) => `/api/reports/completion?${YEARS}&groupBy=${groupBy}`;
  const { total } = await director.call<CompletionReport>('GET', path('none'));
  console.log(
    `\nCompletion over ${total.enrolled.toLocaleString('en-US')} courses, median in ms\n`,
  );
  for (const groupBy of completionGroupings) {
    const ms = await median(() => director.call('GET', path(groupBy)));
    console.log(`${groupBy.padEnd(40)} ${Math.round(ms)}`);
  }
}
