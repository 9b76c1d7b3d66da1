import type { User } from '@shared/contracts/accounts-contract';
import { personControls } from '../person-form/person-controls';
import { changeOf } from './change-of';

const user: User = {
  id: '01940000-0000-7000-8000-000000000001',
  email: 'vera@clinic.example',
  displayName: 'Vera Lindqvist',
  status: 'active',
  roles: ['nurse', 'front-desk'],
  siteIds: ['a', 'b'],
  medicalDirector: false,
  student: false,
};
const chosen = personControls(user).getRawValue();

describe('changeOf', () => {
  it('is nothing when the same is chosen, in whatever order', () => {
    expect(changeOf(user, chosen)).toBeNull();
    expect(changeOf(user, { ...chosen, roles: ['front-desk', 'nurse'] })).toBeNull();
    expect(changeOf(user, { ...chosen, displayName: ' Vera Lindqvist ' })).toBeNull();
  });

  it('sends what differs and nothing else', () => {
    expect(changeOf(user, { ...chosen, student: true })).toEqual({ student: true });
    expect(changeOf(user, { ...chosen, siteIds: [] })).toEqual({ siteIds: [] });
    expect(changeOf(user, { ...chosen, roles: ['nurse'] })).toEqual({ roles: ['nurse'] });
  });

  it('keeps a member of staff who is a patient as well a patient', () => {
    const both: User = { ...user, roles: ['patient', 'nurse'] };
    const controls = personControls(both);
    expect(controls.controls.roles.value).toEqual(['nurse']);
    expect(changeOf(both, controls.getRawValue())).toBeNull();
    expect(changeOf(both, { ...controls.getRawValue(), roles: ['physician'] })).toEqual({
      roles: ['patient', 'physician'],
    });
  });
});

describe('personControls', () => {
  it('asks staff for a role, and a patient for none', () => {
    expect(personControls().controls.roles.valid).toBe(false);
    expect(personControls({ ...user, roles: ['patient'] }).controls.roles.valid).toBe(true);
  });
});
