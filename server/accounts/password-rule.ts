import { passwordLength } from '@shared/contracts/accounts-contract';
import common from './common-passwords.json';

/**
 * NIST SP 800-63B-4, 3.1.1.2: at least 15 characters where a password is the only factor, no rule about their kinds,
 * and a list of what is commonly used, expected or compromised. How near to the list is too near is ours.
 */
export type PasswordFault = 'too-short' | 'too-long' | 'common' | 'context';

const COMMON = new Set(common.passwords.split(' '));
const ROWS = '1234567890 qwertyuiop asdfghjkl zxcvbnm';
/** Words that every account here has in common. */
const PLACE_WORDS = [
  ...['plimsoll', 'cardiac', 'rehabilitation', 'rehab', 'heart', 'clinic', 'hospital', 'program'],
  ...['administrator', 'admin', 'physiologist', 'physician', 'doctor', 'nurse', 'patient'],
  ...['director', 'frontdesk', 'exercise', 'password', 'welcome'],
];
/** Fewer characters than this beside what anyone would guess are no password of their own. */
const OWN_PART = 8;

/** Normalised once, so that the same password typed on another keyboard is the same. */
export const normalizePassword = (password: string): string => password.normalize('NFC');

const follows = (a: string, b: string): boolean => {
  const step = (b.codePointAt(0) ?? 0) - (a.codePointAt(0) ?? 0);
  return Math.abs(step) <= 1 || ROWS.includes(a + b) || ROWS.includes(b + a);
};

/** Like 123456789 or qwertyuiop: nearly every character follows from the one before. */
function isRun(text: string): boolean {
  const characters = [...text];
  const following = characters.filter((c, i) => i > 0 && follows(characters[i - 1] ?? '', c));
  return characters.length > 1 && following.length >= 0.8 * (characters.length - 1);
}

/** The shortest part that, said again and again, makes the whole. */
function repeatedPart(text: string): string {
  for (let length = 1; length < text.length; length += 1) {
    const part = text.slice(0, length);
    if (part.repeat(Math.ceil(text.length / length)).startsWith(text)) return part;
  }
  return text;
}

function isCommon(password: string): boolean {
  if (COMMON.has(password) || isRun(password)) return true;
  const part = repeatedPart(password);
  if (part !== password && (part.length < OWN_PART || COMMON.has(part) || isRun(part))) return true;
  const core = password.replace(/^[^\p{L}]+|[^\p{L}]+$/gu, '');
  const around = password.replace(core, '');
  return COMMON.has(core) && (around.length < OWN_PART || isRun(around));
}

function leansOnContext(password: string, words: readonly string[]): boolean {
  const longestFirst = [...words].sort((a, b) => b.length - a.length);
  const left = longestFirst.reduce((rest, word) => rest.replaceAll(word, ''), password);
  return left !== password && left.replace(/[^\p{L}\p{N}]/gu, '').length < OWN_PART;
}

/** Words of four letters or more, as they stand in names and addresses. */
const wordsOf = (texts: readonly string[]): string[] =>
  texts.flatMap((text) =>
    text
      .toLowerCase()
      .split(/[^\p{L}\p{N}]+/u)
      .filter((word) => word.length >= 4),
  );

/**
 * @param password as typed, normalised
 * @param about names and addresses that a guesser would try: the person's, the program's, the sites'
 * @returns what is wrong with it, null when it will do
 */
export function passwordFault(password: string, about: readonly string[]): PasswordFault | null {
  const length = [...password].length;
  if (length < passwordLength.minimum) return 'too-short';
  if (length > passwordLength.maximum) return 'too-long';
  const lower = password.toLowerCase();
  if (isCommon(lower)) return 'common';
  return leansOnContext(lower, [...PLACE_WORDS, ...wordsOf(about)]) ? 'context' : null;
}

/** What to do about each fault. */
export const passwordAdvice: Readonly<Record<PasswordFault, string>> = {
  'too-short': `Use at least ${passwordLength.minimum} characters; a few unrelated words will do`,
  'too-long': `Use at most ${passwordLength.maximum} characters`,
  common: 'This is one of the passwords that are tried first; choose a few unrelated words instead',
  context: 'This leans on names and words of this place; choose a few unrelated words instead',
};
