import PDFDocument from 'pdfkit';
import { latoFont } from './sheet-fonts';

const weights = { plain: 400, bold: 700, black: 900 } as const;
type Weight = keyof typeof weights;

/** What the shipped Lato holds beyond ASCII and Latin-1: the quotes and dashes in its main file, these in a second. */
const extended = new Set('ĄąĆćĘęŁłŃńŚśŠšŸŹźŻżŽž');
const main = /^[\u0020-\u007e\u00a1-\u00ff–—‘’“”•…€]$/u;

/** A character that the fonts hold: the letter itself, else the letter without its marks, else a question mark. */
function printable(character: string): string {
  if (main.test(character) || extended.has(character)) return character;
  const bare = character.normalize('NFD').replaceAll(/\p{M}/gu, '');
  return main.test(bare) ? bare : '?';
}

interface Run {
  readonly text: string;
  readonly isExtended: boolean;
}

/** Text cut where another font file goes on. */
export function runsOf(text: string): Run[] {
  const runs: Run[] = [];
  for (const character of Array.from(text.normalize('NFC').replaceAll(/\s/gu, ' '), printable)) {
    const isExtended = extended.has(character);
    const last = runs.at(-1);
    if (last?.isExtended === isExtended) {
      runs[runs.length - 1] = { isExtended, text: last.text + character };
    } else runs.push({ isExtended, text: character });
  }
  return runs;
}

export interface TextStyle {
  /** Of the sheet's text size. */
  readonly scale?: number;
  readonly weight?: Weight;
  readonly color?: string;
  /** Points kept free below, of the text size. */
  readonly after?: number;
}

export interface Column {
  readonly x: number;
  readonly width: number;
}

/** A sheet of U.S. letter paper in Lato; lengths in points. */
export class SheetPaper {
  readonly doc: PDFKit.PDFDocument;
  /** The size of plain text. */
  size = 0;
  readonly #chunks: Buffer[] = [];
  #pages = 0;

  constructor(info: { readonly title: string; readonly author: string; readonly at: Date }) {
    this.doc = new PDFDocument({
      size: 'LETTER',
      margin: 0,
      lang: 'en-US',
      displayTitle: true,
      info: { Title: info.title, Author: info.author, CreationDate: info.at },
      autoFirstPage: false,
    });
    this.doc.on('data', (chunk: Buffer) => void this.#chunks.push(chunk));
    this.doc.on('pageAdded', () => (this.#pages += 1));
    for (const [name, weight] of Object.entries(weights)) {
      for (const subset of ['latin', 'latin-ext'] as const) {
        this.doc.registerFont(`${name}-${subset}`, latoFont(subset, weight));
      }
    }
  }

  /** Begins a page in print of a size. */
  begin(size: number): void {
    this.size = size;
    this.doc.addPage();
    this.#pages = 1;
  }

  /** Whether what was written since has run over its page. */
  get overflows(): boolean {
    return this.#pages > 1;
  }

  get y(): number {
    return this.doc.y;
  }

  set y(y: number) {
    this.doc.y = y;
  }

  /** Writes a paragraph and moves below it. */
  write(text: string, { x, width }: Column, style: TextStyle = {}): void {
    const { scale = 1, weight = 'plain', color = '#16233b', after = 0.35 } = style;
    const runs = runsOf(text);
    this.doc.fontSize(this.size * scale).fillColor(color);
    for (const [index, run] of runs.entries()) {
      this.doc.font(`${weight}-${run.isExtended ? 'latin-ext' : 'latin'}`);
      const options = { width, lineGap: this.size * 0.1, continued: index < runs.length - 1 };
      if (index === 0) this.doc.text(run.text, x, this.doc.y, options);
      else this.doc.text(run.text, options);
    }
    this.doc.y += this.size * after;
  }

  finish(): Promise<Buffer> {
    return new Promise((resolve, reject) => {
      this.doc.on('end', () => {
        resolve(Buffer.concat(this.#chunks));
      });
      this.doc.on('error', reject);
      this.doc.end();
    });
  }
}
