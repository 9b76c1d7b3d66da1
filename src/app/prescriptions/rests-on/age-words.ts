const dayLength = 86_400_000;

/**
 * "61 days ago: old, measure or ask again".
 * @param date of the entry and `today`, YYYY-MM-DD
 * @param validDays after how many days by the policy it no longer counts, where the policy says
 */
export function ageWords(
  date: string,
  today: string,
  isOld: boolean,
  validDays: number | undefined,
): string {
  const days = Math.round((Date.parse(today) - Date.parse(date)) / dayLength);
  const ago = days === 0 ? 'today' : days === 1 ? '1 day ago' : `${days} days ago`;
  const counts = validDays === undefined ? '' : `, counts for ${validDays} days by the policy`;
  return isOld ? `${ago}${counts}: old, measure or ask again` : `${ago}${counts}`;
}
