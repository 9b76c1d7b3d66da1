const longest = 120;
const ends = /[\p{Cc}\p{Zl}\p{Zp}]+/gu;
// Embeddings, overrides and isolates could turn round the rest of a line; marks (U+200E, U+200F) stay.
const turns = /[\u202a-\u202e\u2066-\u2069]/gu;
const graphemes = new Intl.Segmenter('en', { granularity: 'grapheme' });

/**
 * Makes a value that people typed fit for one line of a message: no line break or other control
 * character, nothing that turns the direction of what follows, at most 120 characters as people
 * count them (an emoji is one).
 */
export function cleanText(text: string): string {
  const line = text.normalize('NFC').replace(ends, ' ').replace(turns, '').trim();
  const parts = [...graphemes.segment(line)];
  if (parts.length <= longest) return line;
  return `${parts
    .slice(0, longest - 1)
    .map(({ segment }) => segment)
    .join('')}…`;
}

/**
 * An address for a link, as it may stand in a message.
 * @throws Error for anything but an absolute http or https address
 */
export function webAddress(address: string): string {
  const url = URL.canParse(address) ? new URL(address) : null;
  if (url?.protocol !== 'https:' && url?.protocol !== 'http:') {
    throw new Error('A link in a message needs an absolute http or https address.');
  }
  return url.href;
}
