import type { ParamMap, Params } from '@angular/router';
import {
  ageBands,
  completionGroupings,
  completionParts,
  type CompletionGrouping,
} from '@shared/contracts/reports-contract';
import { addDays } from '@shared/scheduling/wall-time';

export interface Choice {
  readonly value: string;
  readonly label: string;
}

export const groupingChoices: readonly { value: CompletionGrouping; label: string }[] = [
  { value: 'diagnosis', label: 'Diagnosis' },
  { value: 'month', label: 'Month of the first session' },
  { value: 'site', label: 'Site' },
  { value: 'sex', label: 'Sex' },
  { value: 'age-band', label: 'Age' },
  { value: 'payer', label: 'Payer' },
];

export const sexChoices: readonly Choice[] = [
  { value: 'female', label: 'Female' },
  { value: 'male', label: 'Male' },
  { value: 'unknown', label: 'Not recorded' },
];

const ageWords: Readonly<Record<(typeof ageBands)[number], string>> = {
  'under-55': 'Under 55',
  '55-64': '55 to 64',
  '65-74': '65 to 74',
  '75-and-over': '75 and over',
};
export const ageChoices: readonly Choice[] = ageBands.map((value) => ({
  value,
  label: ageWords[value],
}));

export const diagnosisChoices: readonly Choice[] = [
  { value: 'heart-attack', label: 'Heart attack, no procedure' },
  { value: 'stent', label: 'Stent' },
  { value: 'bypass', label: 'Bypass' },
  { value: 'valve', label: 'Valve' },
  { value: 'transplant', label: 'Transplant' },
  { value: 'stable-angina', label: 'Stable angina' },
  { value: 'heart-failure', label: 'Heart failure' },
  { value: 'assist-device', label: 'Assist device' },
  { value: 'other', label: 'Other' },
];

/** What stands in the page's address; `to` is the last day that counts, as people say it. */
export interface CompletionChoices {
  readonly from: string;
  readonly to: string;
  readonly groupBy: CompletionGrouping;
  readonly siteId: string;
  readonly sex: string;
  readonly ageBand: string;
  readonly diagnosis: string;
}

const isDate = (text: string | null): text is string =>
  text !== null && /^\d{4}-\d{2}-\d{2}$/.test(text);

const WINDOW_DAYS = 252;

/** From the first of the month thirteen months ago to the last first session whose 36 weeks have passed. */
export function ripeSpan(today: string): { from: string; to: string } {
  const [year = 0, month = 1] = today.split('-').map(Number);
  const first = new Date(Date.UTC(year, month - 1 - 13, 1));
  return { from: first.toISOString().slice(0, 10), to: addDays(today, -WINDOW_DAYS - 1) };
}

export function choicesOf(params: ParamMap, today: string): CompletionChoices {
  const ripe = ripeSpan(today);
  const [from, to] = [params.get('from'), params.get('to')];
  const grouping = completionGroupings.find((each) => each === params.get('by'));
  return {
    from: isDate(from) ? from : ripe.from,
    to: isDate(to) ? to : ripe.to,
    groupBy: grouping === undefined || grouping === 'none' ? 'diagnosis' : grouping,
    siteId: params.get('site') ?? '',
    sex: params.get('sex') ?? '',
    ageBand: params.get('age') ?? '',
    diagnosis: params.get('diagnosis') ?? '',
  };
}

/** The choices as query parameters of the page; what is not chosen is left out. */
export function paramsOf({ groupBy, siteId, ageBand, ...rest }: CompletionChoices): Params {
  const all = { ...rest, by: groupBy, site: siteId, age: ageBand };
  return Object.fromEntries(Object.entries(all).map(([key, value]) => [key, value || null]));
}

/** The choices as the API takes them: `to` is the first day that does not count. */
export function callOf({ from, to, groupBy, ...filters }: CompletionChoices): Params {
  const chosen = Object.entries(filters).filter(([, value]) => value !== '');
  return { from, to: addDays(to, 1), groupBy, ...Object.fromEntries(chosen) };
}

export const partOf = (params: ParamMap) =>
  completionParts.find((each) => each === params.get('part')) ?? 'enrolled';
