const isLeapYear = (year: number): boolean =>
  (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0;

/**
 * Whole years of age on a local date; both dates YYYY-MM-DD, the birth not later. Who was born on 29 February comes of age
 * on the 28th where there is none. Lists ask this for every row, so it makes no date objects.
 */
export function ageOn(birthDate: string, localDate: string): number {
  const year = Number(localDate.slice(0, 4));
  const born = birthDate.slice(5);
  const birthday = born === '02-29' && !isLeapYear(year) ? '02-28' : born;
  const years = year - Number(birthDate.slice(0, 4));
  return localDate.slice(5) < birthday ? years - 1 : years;
}
