import { safeReturnPath } from './return-path';

const origin = 'https://plimsoll.example';

describe('safeReturnPath', () => {
  it.each(['/patients', '/patients/1?tab=plan#goals', '/my/range'])('keeps %s', (path) => {
    expect(safeReturnPath(path, origin)).toBe(path);
  });

  it.each([
    null,
    undefined,
    '',
    'patients',
    '//elsewhere.example/patients',
    '/\\elsewhere.example',
    '/\t/elsewhere.example',
    '/%2e%2e//elsewhere.example',
    '/..//elsewhere.example',
    'https://elsewhere.example/patients',
    'javascript:alert(1)',
    '/sign-in?return=/sign-in',
  ])('refuses %s', (path) => {
    expect(safeReturnPath(path, origin)).toBeNull();
  });
});
