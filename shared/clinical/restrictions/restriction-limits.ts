import type { RestrictionKind } from '../training/restrictions';

interface Limit {
  readonly lowest: number;
  readonly highest: number;
  readonly unit: 'kg' | 'L/min' | 'mmHg';
}

/** The number that a restriction must give; null where it has none. */
export const restrictionLimits: Readonly<Record<RestrictionKind, Limit | null>> = {
  sternum: null,
  'device-arm': null,
  joint: null,
  fall: null,
  lifting: { lowest: 0.5, highest: 50, unit: 'kg' },
  oxygen: { lowest: 0.25, highest: 15, unit: 'L/min' },
  pressure: { lowest: 90, highest: 220, unit: 'mmHg' },
  claudication: null,
};

export const restrictionWords: Readonly<Record<RestrictionKind, string>> = {
  sternum: 'Sternum heals',
  'device-arm': 'Device arm',
  joint: 'Joint',
  fall: 'Fall risk',
  lifting: 'Lifting limit',
  oxygen: 'Oxygen',
  pressure: 'Blood-pressure ceiling',
  claudication: 'Claudication',
};

/** As 4.5 kg, 2 L/min, 150/90 mmHg; empty where the restriction has no number. */
export function limitWords(
  kind: RestrictionKind,
  limit: number | null,
  diastolic: number | null,
): string {
  const unit = restrictionLimits[kind]?.unit;
  if (limit === null || unit === undefined) return '';
  return `${limit}${diastolic === null ? '' : `/${diastolic}`} ${unit}`;
}
