import { describe, expect, it } from 'vitest';
import { cautionSeverity, type CautionCode } from '../clinical/prescribing/answer';
import { prescriptionFacts } from '../clinical/prescribing/effect-of-fact';
import { effortSteps, effortWords, isInEffort } from './effort-words';
import {
  cautionWords,
  changeWords,
  countWords,
  emergencyWords,
  homeWords,
  pulseSteps,
  reviewWords,
  todayWords,
} from './range-words';

const sentencesOf = (text: string) => text.split(/[.!?:]\s*/).filter((part) => part !== '');
const syllablesOf = (word: string) =>
  Math.max(
    1,
    (
      word
        .toLowerCase()
        .replace(/e\b/, '')
        .match(/[aeiouy]+/g) ?? []
    ).length,
  );

/** Flesch–Kincaid grade: 0.39 words a sentence + 11.8 syllables a word − 15.59 (Kincaid 1975). */
function gradeOf(text: string): number {
  const words = text.match(/[A-Za-z’]+/g) ?? [];
  const syllables = words.reduce((sum, word) => sum + syllablesOf(word), 0);
  return (
    (0.39 * words.length) / sentencesOf(text).length + (11.8 * syllables) / words.length - 15.59
  );
}

const codes = Object.keys(cautionSeverity) as CautionCode[];
const everything = [
  ...effortSteps.map(({ feel }) => feel),
  ...changeWords(prescriptionFacts),
  reviewWords,
  todayWords,
  ...cautionWords(codes),
  ...pulseSteps,
  ...homeWords({ perWeek: 2, warmUpMinutes: 10, coolDownMinutes: 10 }),
  `${emergencyWords(true)}: stop and call 911.`,
];

describe('what patients are told', () => {
  it('reads at grade 6 or below, as a whole', () => {
    expect(gradeOf(everything.join(' '))).toBeLessThan(6);
  });

  it('has no word of the trade', () => {
    expect(everything.join(' ')).not.toMatch(
      /ischemia|threshold|ceiling|withdrawn|arrhythmia|bpm|prescri|perceived|exertion/i,
    );
  });

  it('does not frighten when a range is set anew', () => {
    const text = [...changeWords(prescriptionFacts), reviewWords].join(' ');
    expect(text).not.toMatch(/danger|risk|emergency|die|death|failed|wrong|attack/i);
    expect(text).toContain('go by how it feels');
  });
});

it('tells a caution that concerns what one does, and no other', () => {
  expect(cautionWords(['defer-to-local-policy', 'estimated-vo2-runs-high'])).toEqual([]);
  expect(cautionWords(['claudication-leads'])).toHaveLength(1);
});

it.each([
  [{ lower: 16, upper: 16 }, '16'],
  [{ lower: 16, upper: 17 }, '16 or 17'],
  [{ lower: 15, upper: 18 }, '15 to 18'],
])('counts %o as %s', (count, words) => {
  expect(countWords(count)).toBe(words);
});

it('leaves no number of effort without words', () => {
  for (let number = 6; number <= 20; number += 1) {
    const steps = effortSteps.filter((step) => isInEffort(step, { lower: number, upper: number }));
    expect(steps).toHaveLength(1);
  }
});

it.each([
  [10, 'easy'],
  [12, 'with ease'],
  [13, 'still talk'],
  [17, 'a few words'],
])('an effort up to %s feels %s', (upper, words) => {
  expect(effortWords({ lower: 9, upper })).toContain(words);
});

it('asks for home exercise only what the team allows', () => {
  expect(homeWords({ perWeek: 0, warmUpMinutes: 5, coolDownMinutes: 5 })).toHaveLength(1);
  expect(homeWords({ perWeek: 1, warmUpMinutes: 5, coolDownMinutes: 6 }).join(' ')).toMatch(
    /Ask your team first.*1 day a week.*5 minutes.*6 minutes/,
  );
});
