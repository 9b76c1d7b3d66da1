/** A unit that a number may be typed in. */
export interface Unit {
  readonly name: string;
  /** The contract's number from what was typed; NaN for what is no number, null for nothing. */
  readonly read: (text: string) => number | null;
  /** What stands in the field for the contract's number. */
  readonly write: (value: number) => string;
}

const plain = /^[+-]?(\d+([.,]\d*)?|[.,]\d+)$/;

function numberOf(text: string): number | null {
  const trimmed = text.trim();
  if (trimmed === '') return null;
  return plain.test(trimmed) ? Number(trimmed.replace(',', '.')) : NaN;
}

const rounded = (value: number, digits: number): string => String(Number(value.toFixed(digits)));

/** The contract's own unit. */
export const inUnit = (name: string): Unit => ({
  name,
  read: numberOf,
  write: (value) => rounded(value, 3),
});

const scaled = (name: string, factor: number): Unit => ({
  name,
  read: (text) => {
    const value = numberOf(text);
    return value === null ? null : value * factor;
  },
  write: (value) => rounded(value / factor, 1),
});

export const kilogram = inUnit('kg');
/** The international avoirdupois pound, exact. */
export const pound = scaled('lb', 0.45359237);
export const centimeter = inUnit('cm');

const centimetersPerInch = 2.54;
const feetAndInches = /^(\d)\s*(?:ft|['’′]|\s)\s*(?:(\d{1,2}(?:[.,]\d+)?)\s*(?:in|["”″])?)?$/;

/** `5 10`, `5'10"`, `5 ft 10 in`, or inches alone, as `70`. */
export const footAndInch: Unit = {
  name: 'ft in',
  read: (text) => {
    const [, feet, inches = '0'] = feetAndInches.exec(text.trim()) ?? [];
    if (feet !== undefined) {
      return (Number(feet) * 12 + Number(inches.replace(',', '.'))) * centimetersPerInch;
    }
    const value = numberOf(text);
    return value === null ? null : value * centimetersPerInch;
  },
  write: (value) => {
    const inches = Math.round(value / centimetersPerInch);
    return `${Math.floor(inches / 12)} ft ${inches % 12} in`;
  },
};

export const bpm = inUnit('bpm');
const msPerMinute = 60_000;

/** The cycle length of a device's zone; the rate is rounded down to a tenth, since a zone begins no later than it says. */
export const cycleLength: Unit = {
  name: 'ms',
  read: (text) => {
    const value = numberOf(text);
    return value === null ? null : Math.floor((msPerMinute / value) * 10) / 10;
  },
  write: (value) => rounded(msPerMinute / value, 0),
};
