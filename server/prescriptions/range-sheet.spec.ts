import { describe, expect, it } from 'vitest';
import { changed, fullSheet, sheetOf } from '../../test/builders/range-sheets';
import { readPdf } from '../../test/builders/read-pdf';
import { rangeSheet, type Sheet } from './range-sheet';
import { runsOf } from './sheet-paper';

const now = new Date('2026-12-02T03:00:00Z');
const read = async (sheet: Sheet) => readPdf(await rangeSheet(sheet, now));

describe('the sheet of a range', () => {
  it('tells range, count, limit, signs, phone, home, program, date and signers on one page', async () => {
    for (const { pages, text } of await read(sheetOf())) {
      expect(pages).toBe(1);
      for (const words of [
        'Harbor Lane, Quayside',
        'My range: Ada Ferreira',
        'Set December 1, 2026. Signed by I. Brandt and M. Okafor, MD.',
        'Printed December 1, 2026.',
        '91–105',
        'beats a minute',
        '16 or 17 beats in 10 seconds',
        'Stay under 108. If you get there, slow down and rest.',
        'Chest pain, fainting, trouble breathing: stop and call 911.',
        'call (555) 010-0142',
        'At rest 62',
        'aim for 2 days a week',
      ]) {
        expect(text).toContain(words);
      }
      expect(text).not.toContain('Keep in mind');
    }
  });

  it('says plainly that effort leads while a range is set anew, and why', async () => {
    const review = {
      state: 'review',
      target: null,
      tenSecondCount: null,
      effort: { lower: 11, upper: 13 },
    } as const;
    for (const { pages, text } of await read(
      sheetOf({ ...review, changes: [changed('rate-acting-drug-raised')] }),
    )) {
      expect(pages).toBe(1);
      expect(text).toContain('Your team will set a new range');
      expect(text).toContain('A heart medicine was changed.');
      expect(text).toContain('Go by how it feels 11 to 13');
      expect(text).toContain('Stay under 108');
      expect(text).not.toMatch(/91–105|Count your pulse/);
    }
  });

  it('says that a missed dose counts for today alone', async () => {
    const missed = {
      fact: 'dose-missed-today',
      effect: 'effort-today',
      at: now.toISOString(),
    } as const;
    const today = {
      state: 'today',
      changes: [missed],
      target: null,
      tenSecondCount: null,
    } as const;
    for (const { text } of await read(sheetOf({ ...today, changes: [missed] }))) {
      expect(text).toContain('You missed today’s dose. Today, go by how it feels.');
      expect(text).toContain('tomorrow');
    }
  });

  it('stays one page with every caution and the longest names, and loses none of them', async () => {
    for (const { pages, text } of await read(fullSheet())) {
      expect(pages).toBe(1);
      const squeezed = text.replaceAll(' ', '');
      const { patient, range, program, site } = fullSheet();
      for (const words of [patient, range.setBy, range.signedBy ?? '', program, site.name]) {
        expect(squeezed).toContain(words.replaceAll(' ', ''));
      }
      expect(text).toContain('Work for a short time, rest, then go on.');
      expect(text).toContain('What your doctor and team tell you comes first.');
    }
  });

  it('draws no line where there is nothing to draw', async () => {
    const free = { target: null, tenSecondCount: null, stayUnder: null };
    for (const { text } of await read(sheetOf(free))) {
      expect(text).not.toMatch(/At rest|Stay under/);
    }
  });
});

it('cuts a name where the other font file goes on, and bares a letter that neither holds', () => {
  expect(runsOf('Žofie Novák')).toEqual([
    { text: 'Ž', isExtended: true },
    { text: 'ofie Novák', isExtended: false },
  ]);
  expect(runsOf('Dvořáček 李')).toEqual([
    { text: 'Dvoráček'.replace('č', 'c') + ' ?', isExtended: false },
  ]);
});
