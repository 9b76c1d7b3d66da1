import { execFile } from 'node:child_process';
import { promisify } from 'node:util';
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';

/** A PDF as others read it. */
export interface PdfText {
  readonly pages: number;
  /** With single spaces, lines joined. */
  readonly text: string;
}

const joined = (text: string): string => text.replaceAll(/\s+/g, ' ').trim();

async function byPdfjs(bytes: Buffer): Promise<PdfText> {
  const pdf = await getDocument({ data: new Uint8Array(bytes), verbosity: 0 }).promise;
  const texts: string[] = [];
  for (let number = 1; number <= pdf.numPages; number += 1) {
    const { items } = await (await pdf.getPage(number)).getTextContent();
    texts.push(
      items.map((item) => ('str' in item ? item.str + (item.hasEOL ? '\n' : '') : '')).join(''),
    );
  }
  return { pages: pdf.numPages, text: joined(texts.join('\n')) };
}

async function byPoppler(bytes: Buffer): Promise<PdfText> {
  const reading = promisify(execFile)('pdftotext', ['-enc', 'UTF-8', '-raw', '-', '-']);
  reading.child.stdin?.end(bytes);
  const { stdout } = await reading;
  // A form feed ends each page.
  return { pages: stdout.split('\f').length - 1, text: joined(stdout) };
}

/** Reads a PDF back by every reader on this machine: pdf.js comes with the packages, poppler where it is installed. */
export async function readPdf(bytes: Buffer): Promise<PdfText[]> {
  const read = [await byPdfjs(bytes)];
  try {
    read.push(await byPoppler(bytes));
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw error;
  }
  return read;
}
