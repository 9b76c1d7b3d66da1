import { roles } from '@shared/contracts/accounts-contract';
import { areas, areasFor, landingFor } from './navigation';

const everything = areas.map((area) => area.path);

describe('landingFor', () => {
  it.each([
    ['nurse', '/floor'],
    ['exercise-physiologist', '/today'],
    ['physician', '/today'],
    ['front-desk', '/today'],
    ['director', '/reports'],
    ['administrator', '/settings'],
    ['patient', '/my/sessions'],
  ] as const)('sends a %s to %s', (role, path) => {
    expect(landingFor([role], everything)).toBe(path);
  });

  it('takes the first task of who holds several roles', () => {
    expect(landingFor(['administrator', 'nurse'], everything)).toBe('/floor');
  });

  it('takes what is open where the first task has no page, or says that nothing is', () => {
    expect(landingFor(['nurse'], ['patients', 'schedule'])).toBe('/patients');
    expect(landingFor([], everything)).toBe('/not-allowed');
  });
});

describe('areasFor', () => {
  it('shows a patient their own pages alone', () => {
    const labels = areasFor(['patient'], everything).map((area) => area.label);
    expect(labels).toEqual(['My sessions', 'My range', 'My progress', 'Payments', 'My details']);
  });

  it('shows no staff member a patient’s own pages', () => {
    for (const role of roles.filter((one) => one !== 'patient')) {
      const paths = areasFor([role], everything).map((area) => area.path);
      expect(paths.filter((path) => path.startsWith('my/'))).toEqual([]);
      expect(paths.length).toBeGreaterThan(0);
    }
  });

  it('shows only what has a route', () => {
    expect(areasFor(['nurse'], ['floor', 'billing']).map((area) => area.path)).toEqual(['floor']);
  });
});
