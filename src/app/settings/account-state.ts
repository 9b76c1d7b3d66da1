import type { User } from '@shared/contracts/accounts-contract';
import type { Tone } from '../ui/state-chip/state-chip';

export const accountStates: Readonly<Record<User['status'], { word: string; tone: Tone }>> = {
  invited: { word: 'invited', tone: 'due' },
  active: { word: 'active', tone: 'in' },
  disabled: { word: 'disabled', tone: 'plain' },
};
