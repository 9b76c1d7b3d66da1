import { Pipe, type PipeTransform } from '@angular/core';
import { formatLocalDate } from '../words/dates';

// The browser's own formatting: Angular's pipes bring tables of words and rules that every page would load.

const locale = 'en-US';

/** A date of the local calendar, YYYY-MM-DD, as "Nov 18, 2026"; nothing for none. */
@Pipe({ name: 'localDate' })
export class LocalDatePipe implements PipeTransform {
  transform(date: string | null): string {
    return date === null ? '' : formatLocalDate(date);
  }
}

const styles = {
  day: { dateStyle: 'medium' },
  longDay: { dateStyle: 'long' },
  minute: { dateStyle: 'medium', timeStyle: 'short' },
  second: { dateStyle: 'medium', timeStyle: 'medium' },
} as const satisfies Record<string, Intl.DateTimeFormatOptions>;

/** An instant on the reader's own clock, to the day, the minute or the second. */
@Pipe({ name: 'instant' })
export class InstantPipe implements PipeTransform {
  transform(instant: string, to: keyof typeof styles): string {
    return new Intl.DateTimeFormat(locale, styles[to]).format(new Date(instant));
  }
}

/** A number with so many decimals; nothing for none. */
@Pipe({ name: 'decimals' })
export class DecimalsPipe implements PipeTransform {
  transform(value: number | null, decimals: number): string {
    if (value === null) return '';
    const digits = { minimumFractionDigits: decimals, maximumFractionDigits: decimals };
    return new Intl.NumberFormat(locale, digits).format(value);
  }
}

/** A fraction, 0 to 1, in whole percent: "63%", or "63" without its sign; nothing for none. */
@Pipe({ name: 'share' })
export class SharePipe implements PipeTransform {
  transform(fraction: number | null, sign = true): string {
    if (fraction === null) return '';
    const text = new Intl.NumberFormat(locale, { style: 'percent' }).format(fraction);
    return sign ? text : text.replace('%', '');
  }
}
