import { centimeter, cycleLength, footAndInch, kilogram, pound } from './units';

describe('units of entry', () => {
  it.each([
    ['84', 84],
    ['83,9', 83.9],
    ['.5', 0.5],
    ['', null],
    ['  ', null],
    ['8 4', NaN],
    ['abc', NaN],
    ['1e3', NaN],
  ])('%j kg is %s', (text, value) => {
    expect(kilogram.read(text)).toEqual(value);
  });

  // The international pound is 0.45359237 kg exactly, the inch 2.54 cm (NIST SP 811, appendix B).
  it('185 lb is 83.91458845 kg', () => {
    expect(pound.read('185')).toBeCloseTo(83.91458845, 10);
    expect(pound.read('')).toBeNull();
  });

  it.each([
    ['5 10', 177.8],
    ['5\'10"', 177.8],
    ['5 ft 10 in', 177.8],
    ['5’10', 177.8],
    ['5 ft', 152.4],
    ['70', 177.8],
    ['6 ft 0.5', 184.15],
  ])('%j is %s cm', (text, value) => {
    expect(footAndInch.read(text)).toBeCloseTo(value, 10);
  });

  it('writes back what it read', () => {
    expect(pound.write(pound.read('185') ?? 0)).toBe('185');
    expect(footAndInch.write(177.8)).toBe('5 ft 10 in');
    expect(footAndInch.write(182.8)).toBe('6 ft 0 in');
    expect(centimeter.write(177.8)).toBe('177.8');
  });

  it.each([
    ['320', 187.5],
    ['350', 171.4],
    ['', null],
  ])('a cycle length of %j ms begins at %s bpm, rounded down', (text, value) => {
    expect(cycleLength.read(text)).toBe(value);
  });
});
