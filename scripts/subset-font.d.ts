/** The part of the package that subset-icons.mjs calls; it brings no types of its own. */
declare module 'subset-font' {
  export default function subsetFont(
    font: Buffer,
    characters: string,
    options: { targetFormat: 'woff2'; noLayoutClosure?: boolean },
  ): Promise<Buffer>;
}
