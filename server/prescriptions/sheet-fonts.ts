import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { inflateSync } from 'node:zlib';

const fileOf = createRequire(import.meta.url).resolve;

const padded = (length: number): number => Math.ceil(length / 4) * 4;

/**
 * The font inside a WOFF 1 file, its tables inflated natively: the PDF library would inflate them in JavaScript for every
 * sheet, at a quarter of a second. Layout of the file: W3C, WOFF File Format 1.0, sections 3 to 5.
 */
export function unpackWoff(woff: Buffer): Buffer {
  const count = woff.readUInt16BE(12);
  const directory = Buffer.alloc(12 + 16 * count);
  const power = 2 ** Math.floor(Math.log2(count));
  woff.copy(directory, 0, 4, 8);
  directory.writeUInt16BE(count, 4);
  directory.writeUInt16BE(power * 16, 6);
  directory.writeUInt16BE(Math.log2(power), 8);
  directory.writeUInt16BE(count * 16 - power * 16, 10);
  const tables: Buffer[] = [];
  let offset = directory.length;
  for (let index = 0; index < count; index += 1) {
    const entry = woff.subarray(44 + 20 * index, 64 + 20 * index);
    const [start, packed, length] = [4, 8, 12].map((at) => entry.readUInt32BE(at)) as [
      number,
      number,
      number,
    ];
    const stored = woff.subarray(start, start + packed);
    const table = Buffer.alloc(padded(length));
    (packed < length ? inflateSync(stored) : stored).copy(table);
    const record = 12 + 16 * index;
    entry.copy(directory, record, 0, 4);
    entry.copy(directory, record + 4, 16, 20);
    directory.writeUInt32BE(offset, record + 8);
    directory.writeUInt32BE(length, record + 12);
    tables.push(table);
    offset += table.length;
  }
  return Buffer.concat([directory, ...tables]);
}

const read = new Map<string, Buffer>();

/** Lato as it is shipped with the application; read once. */
export function latoFont(subset: 'latin' | 'latin-ext', weight: 400 | 700 | 900): Buffer {
  const file = `@fontsource/lato/files/lato-${subset}-${weight}-normal.woff`;
  const font = read.get(file) ?? unpackWoff(readFileSync(fileOf(file)));
  read.set(file, font);
  return font;
}
