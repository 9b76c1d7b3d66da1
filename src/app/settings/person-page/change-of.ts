import type { User, UserChange } from '@shared/contracts/accounts-contract';
import type { PersonControls } from '../person-form/person-controls';

type Chosen = ReturnType<PersonControls['getRawValue']>;

const sameSet = (one: readonly string[], other: readonly string[]): boolean =>
  [...one].sort().join() === [...other].sort().join();

/** What differs from the account as it was read, so that two administrators overwrite no more than they touched; null when nothing does. */
export function changeOf(user: User, chosen: Chosen): UserChange | null {
  const patient = user.roles.filter((role) => role === 'patient');
  const roles = [...patient, ...chosen.roles];
  const name = chosen.displayName.trim();
  const change: UserChange = {
    ...(name !== user.displayName && { displayName: name }),
    ...(!sameSet(roles, user.roles) && { roles }),
    ...(!sameSet(chosen.siteIds, user.siteIds) && { siteIds: [...chosen.siteIds] }),
    ...(chosen.medicalDirector !== user.medicalDirector && {
      medicalDirector: chosen.medicalDirector,
    }),
    ...(chosen.student !== user.student && { student: chosen.student }),
  };
  return Object.keys(change).length > 0 ? change : null;
}
