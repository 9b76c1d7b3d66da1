import type { CompletionGrouping } from '@shared/contracts/reports-contract';

const SEX: Readonly<Record<string, string>> = {
  female: 'Female',
  male: 'Male',
  unknown: 'Not recorded',
};

const AGE_BAND: Readonly<Record<string, string>> = {
  'under-55': 'Under 55',
  '55-64': '55 to 64',
  '65-74': '65 to 74',
  '75-and-over': '75 and over',
};

const DIAGNOSIS: Readonly<Record<string, string>> = {
  'heart-attack': 'Heart attack, no procedure',
  stent: 'Stent',
  bypass: 'Bypass',
  valve: 'Valve',
  transplant: 'Transplant',
  'stable-angina': 'Stable angina',
  'heart-failure': 'Heart failure',
  'assist-device': 'Assist device',
  other: 'Other',
};

const MONTH = new Intl.DateTimeFormat('en-US', {
  month: 'short',
  year: 'numeric',
  timeZone: 'UTC',
});

/**
 * A group in words.
 * @param name of a group that is a row of a table, as a site
 */
export function groupLabel(
  groupBy: CompletionGrouping,
  group: string,
  name: string | null,
): string {
  switch (groupBy) {
    case 'none':
      return 'All';
    case 'month':
      return MONTH.format(new Date(`${group}-01T00:00:00Z`));
    case 'site':
      return name ?? group;
    case 'sex':
      return SEX[group] ?? group;
    case 'age-band':
      return AGE_BAND[group] ?? group;
    case 'payer':
      return group;
    case 'diagnosis':
      return DIAGNOSIS[group] ?? group;
  }
}
