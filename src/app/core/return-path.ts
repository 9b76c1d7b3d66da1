/**
 * The page to go to after sign-in, from the address.
 * @returns the path when it stays on this host, else null: a link must not lead elsewhere through us
 */
export function safeReturnPath(wanted: string | null | undefined, origin: string): string | null {
  if (!wanted?.startsWith('/')) return null;
  if (!URL.canParse(wanted, origin)) return null;
  const url = new URL(wanted, origin);
  if (url.origin !== origin) return null;
  const path = url.pathname + url.search + url.hash;
  return path.startsWith('//') || url.pathname === '/sign-in' ? null : path;
}
