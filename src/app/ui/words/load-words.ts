import type { MachineSetting } from '@shared/clinical/progression/machine-setting';
import type { ProgressionAction } from '@shared/clinical/progression/propose-progression';
import type { NextStart, Proposal } from '@shared/contracts/progression-contract';
import { powerText, stepText, treadmillText } from './machine-words';
import { metsFloor } from './prescription-words';

type Load = NextStart['load'];
type Modality = MachineSetting['modality'];

export const machineWords: Readonly<Record<Modality, string>> = {
  'treadmill-walk': 'Treadmill, walking',
  'treadmill-run': 'Treadmill, running',
  cycle: 'Cycle',
  arm: 'Arm ergometer',
  step: 'Step',
  stepper: 'Recumbent stepper',
};

export const actionWords: Readonly<Record<ProgressionAction, string>> = {
  hold: 'Hold',
  longer: 'Longer',
  harder: 'Harder',
  easier: 'Easier',
  review: 'Review first',
};

const settingText = (setting: Load['setting']): string => {
  switch (setting.modality) {
    case 'cycle':
    case 'arm':
      return powerText(setting.powerWatts);
    case 'step':
      return stepText(setting.stepHeightMeters, setting.stepsPerMinute);
    case 'stepper':
      return `${metsFloor(setting.mets)} METs`;
    default:
      return treadmillText(setting.speedMph, setting.gradePercent);
  }
};

/** "Treadmill, walking: 2.8 mph, level · 30 min · 3.1 METs" */
export function loadText({
  setting,
  minutes,
  mets,
}: Pick<Load, 'setting'> & {
  readonly minutes: number | null;
  readonly mets?: number | null;
}): string {
  const work = setting.modality === 'stepper' ? null : (mets ?? null);
  return [
    `${machineWords[setting.modality]}: ${settingText(setting)}`,
    minutes === null ? null : `${minutes} min`,
    work === null ? null : `${work.toFixed(1)} METs`,
  ]
    .filter((part) => part !== null)
    .join(' · ');
}

/** Where the start of a session comes from. */
export const startWords = ({ from, by }: NextStart): string =>
  from === 'last-session'
    ? 'as last time'
    : `${from === 'accepted' ? 'accepted' : 'set'} by ${by ?? ''}`;

export const decisionWords: Readonly<Record<NonNullable<Proposal['decision']>['kind'], string>> = {
  accepted: 'Accepted',
  edited: 'Set otherwise',
  dismissed: 'Dismissed',
};
