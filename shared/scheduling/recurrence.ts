import rrule from 'rrule';
import type { Options } from 'rrule';
import { recurrenceFault } from './recurrence-rule';
import { addDays } from './wall-time';

/** Calendar dates of a window: `from` belongs to it, `to` does not. */
export interface DateWindow {
  readonly from: string;
  readonly to: string;
}

/** An RFC 5545 rule on calendar dates; the time of day stands beside it, never inside. */
export interface DateRule {
  /** RRULE value, such as FREQ=WEEKLY;BYDAY=MO,WE,FR */
  readonly recurrence: string;
  /** First date that the rule may give (DTSTART). */
  readonly startsOn: string;
  /** Last date that it may give, or null for no end. */
  readonly endsOn: string | null;
}

const asUtc = (localDate: string) => new Date(`${localDate}T00:00:00Z`);
const earlier = (a: string, b: string) => (a < b ? a : b);

/**
 * The calendar dates of a rule inside a window, in order, none twice.
 * @throws RangeError when the rule is none (see recurrenceFault)
 */
export function recurrenceDates(rule: DateRule, window: DateWindow): string[] {
  const fault = recurrenceFault(rule.recurrence);
  if (fault !== null) throw new RangeError(`${rule.recurrence}: ${fault}`);
  const lastAsked = addDays(window.to, -1);
  const last = rule.endsOn === null ? lastAsked : earlier(rule.endsOn, lastAsked);
  if (last < window.from || last < rule.startsOn) return [];
  const parsed: Partial<Options> = rrule.RRule.parseString(rule.recurrence);
  const ruleUntil = parsed.until?.toISOString().slice(0, 10) ?? last;
  // Without an end, a rule that never matches would be searched to the year 9999.
  const until = asUtc(earlier(ruleUntil, last));
  return new rrule.RRule({ ...parsed, dtstart: asUtc(rule.startsOn), until })
    .between(asUtc(window.from), asUtc(last), true)
    .map((date) => date.toISOString().slice(0, 10));
}
