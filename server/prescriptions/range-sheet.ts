import { DateTime } from 'luxon';
import type { MyRange, ToldRange } from '@shared/contracts/my-range-contract';
import { effortWords } from '@shared/patient-range/effort-words';
import {
  cautionWords,
  changeWords,
  countWords,
  emergencyWords,
  homeWords,
  pulseSteps,
  reviewWords,
  todayWords,
} from '@shared/patient-range/range-words';
import { drawLoadLine } from './sheet-load-line';
import { type Column, SheetPaper } from './sheet-paper';

/** What a sheet is made of: a range that is in force. */
export type Sheet = Omit<MyRange, 'range'> & { readonly range: ToldRange };

const page = { width: 612, height: 792, margin: 40 } as const;
const bottom = page.height - page.margin;
const whole: Column = { x: page.margin, width: page.width - 2 * page.margin };
const lineRoom = 220;
const gap = 18;
/** Points, from the smallest that a sheet full of cautions needs to large print; in steps of half a point. */
const print = { smallest: 10, largest: 19, by: 0.5 } as const;

const oxide = '#a8432f';
const lagoon = '#1f6f6b';
const muted = '#5a6270';

const heading = { weight: 'bold', scale: 1.1, after: 0.15 } as const;

function writeHead(paper: SheetPaper, sheet: Sheet, printedOn: string): void {
  const { range, site, program, patient } = sheet;
  const setOn = DateTime.fromISO(range.setOn, { zone: site.timeZone }).toFormat('MMMM d, yyyy');
  const signers = [range.setBy, range.signedBy].filter((name) => name !== null).join(' and ');
  const place = site.name === program ? program : `${program}, ${site.name}`;
  paper.y = page.margin;
  paper.write(place, whole, { weight: 'bold', scale: 0.85, color: muted, after: 0 });
  paper.write(`My range: ${patient}`, whole, { weight: 'black', scale: 1.5, after: 0.1 });
  const words = `Set ${setOn}. Signed by ${signers}. Printed ${printedOn}.`;
  paper.write(words, whole, { scale: 0.8, color: muted, after: 0.6 });
}

const changesOf = ({ changes }: ToldRange): string =>
  changeWords(changes.map(({ fact }) => fact)).join(' ');

function writeRange(paper: SheetPaper, range: ToldRange, column: Column): void {
  if (range.state === 'review') {
    paper.write('Your team will set a new range', column, { ...heading, scale: 1.2 });
    paper.write(`${changesOf(range)} ${reviewWords}`, column);
  } else if (range.state === 'today') {
    paper.write('Today is different', column, { ...heading, scale: 1.2 });
    paper.write(`${changesOf(range)} ${todayWords}`, column);
  }
  if (range.target) {
    const { lower, upper } = range.target;
    paper.write('When you exercise', column, heading);
    const big = { weight: 'black', scale: 2.6, color: lagoon, after: 0 } as const;
    paper.write(`${lower}–${upper}`, column, big);
    paper.write('beats a minute', column, { weight: 'bold' });
  } else {
    const { lower, upper } = range.effort;
    paper.write('Go by how it feels', column, heading);
    const big = { weight: 'black', scale: 2.2, color: lagoon, after: 0 } as const;
    paper.write(`${lower} to ${upper}`, column, big);
    paper.write('on the effort scale, from 6 (rest) to 20 (all you can)', column);
  }
  paper.write(`It should feel ${effortWords(range.effort)}`, column, { after: 0.6 });
  if (!range.tenSecondCount) return;
  paper.write('Count your pulse', column, heading);
  for (const [index, step] of pulseSteps.entries()) {
    paper.write(`${index + 1}. ${step}`, column, { after: 0.1 });
  }
  const beats = `${countWords(range.tenSecondCount)} beats in 10 seconds is in your range.`;
  paper.write(beats, column, { weight: 'bold' });
}

function writeStop(paper: SheetPaper, { range, site }: Sheet): void {
  const inner = { x: whole.x + 12, width: whole.width - 12 };
  const top = paper.y;
  if (range.stayUnder !== null) {
    const words = `Stay under ${range.stayUnder}. If you get there, slow down and rest.`;
    paper.write(words, inner, { weight: 'bold', after: 0.2 });
  }
  const signs = emergencyWords(range.hasDefibrillator);
  paper.write(`${signs}: stop and call 911.`, inner, { weight: 'bold', color: oxide, after: 0.2 });
  paper.write(
    `Dizzy, sick, or your heart skips? Stop and tell us. Any question: call ${site.phone}.`,
    inner,
    { after: 0 },
  );
  paper.doc.rect(whole.x, top, 4, paper.y - top).fill(oxide);
  paper.y += paper.size * 0.6;
}

function writeList(paper: SheetPaper, title: string, sentences: readonly string[]): void {
  if (sentences.length === 0) return;
  paper.write(title, whole, heading);
  for (const sentence of sentences) {
    paper.write('•', whole, { after: 0 });
    paper.y -= paper.doc.currentLineHeight(true) + paper.size * 0.1;
    paper.write(sentence, { x: whole.x + 14, width: whole.width - 14 }, { after: 0.1 });
  }
  paper.y += paper.size * 0.4;
}

function write(paper: SheetPaper, sheet: Sheet, printedOn: string): void {
  const { range } = sheet;
  writeHead(paper, sheet, printedOn);
  const top = paper.y;
  const hasLine = range.target !== null || range.stayUnder !== null;
  const column = hasLine ? { ...whole, width: whole.width - lineRoom - gap } : whole;
  writeRange(paper, range, column);
  if (hasLine) {
    const height = Math.max(paper.y - top - paper.size, 170);
    const x = whole.x + column.width + gap;
    drawLoadLine(paper, range, { x, y: top + 4, width: lineRoom, height });
    paper.y = Math.max(paper.y, top + height + paper.size);
  }
  writeStop(paper, sheet);
  writeList(paper, 'Keep in mind', cautionWords(range.cautions));
  writeList(paper, 'On days with no class', homeWords(sheet.home));
  const last = 'Changed a medicine, or a stay in a hospital? Call us before you go on.';
  paper.write(`${last} What your doctor and team tell you comes first.`, whole, {
    scale: 0.85,
    color: muted,
    after: 0,
  });
}

/** The largest print in which the sheet fits its page, by halving. @throws when it fits in none */
function largestPrint(fits: (size: number) => boolean): number {
  let [least, most] = [0, Math.round((print.largest - print.smallest) / print.by)];
  const sizeOf = (steps: number): number => print.smallest + steps * print.by;
  if (!fits(sizeOf(least))) throw new Error('The sheet does not fit one page');
  while (least < most) {
    const middle = Math.ceil((least + most) / 2);
    if (fits(sizeOf(middle))) least = middle;
    else most = middle - 1;
  }
  return sizeOf(least);
}

/**
 * A patient's range as a PDF of one page of U.S. letter paper, in the largest print that fits.
 * @param now printed on it, as the site's date
 */
export async function rangeSheet(sheet: Sheet, now: Date): Promise<Buffer> {
  const printedOn = DateTime.fromJSDate(now, { zone: sheet.site.timeZone }).toFormat(
    'MMMM d, yyyy',
  );
  const info = { title: 'My range', author: sheet.program, at: now };
  const draft = new SheetPaper(info);
  const size = largestPrint((tried) => {
    draft.begin(tried);
    write(draft, sheet, printedOn);
    return !draft.overflows && draft.y <= bottom;
  });
  const paper = new SheetPaper(info);
  paper.begin(size);
  write(paper, sheet, printedOn);
  return paper.finish();
}
