import { patientAccount, staff } from './accounts';
import { accountUserId, hiredAt, staffId } from './charting';
import type { Day } from './days';
import { siteId } from './program';
import type { RowOf } from './row-of';

export interface AccountRows {
  readonly users: RowOf<'users'>[];
  readonly userRoles: RowOf<'userRoles'>[];
  readonly userSites: RowOf<'userSites'>[];
}

/** Every account of the demonstration; the password's hash is the loader's to add. */
export function accountRows(anchor: Day): AccountRows {
  const createdAt = hiredAt(anchor);
  const account = { disabledAt: null, student: false, createdAt };
  const administrator = staffId('administrator', anchor);
  const patient = accountUserId(anchor);
  const members = staff.map((member) => ({ ...member, id: staffId(member.key, anchor) }));
  return {
    users: [
      ...members.map(({ id, email, displayName, key }) => ({
        id,
        email,
        displayName,
        medicalDirector: key === 'physician',
        ...account,
      })),
      {
        id: patient,
        email: patientAccount.email,
        displayName: `${patientAccount.givenName} ${patientAccount.familyName}`,
        medicalDirector: false,
        ...account,
      },
    ],
    userRoles: [
      ...members.flatMap(({ id, roles }) =>
        roles.map((role) => ({
          userId: id,
          role,
          grantedAt: createdAt,
          grantedBy: id === administrator ? null : administrator,
        })),
      ),
      {
        userId: patient,
        role: 'patient' as const,
        grantedAt: createdAt,
        grantedBy: administrator,
      },
    ],
    userSites: members.flatMap(({ id, sites }) =>
      sites.map((site) => ({ userId: id, siteId: siteId(site, anchor) })),
    ),
  };
}
