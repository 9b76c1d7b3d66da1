import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mets } from '../../units';
import { mets } from '../../units';
import type { PolicyNumbers } from '../policy-numbers';
import { policyFaults, policyKeysOf } from '../policy-numbers';
import type { RiskLevel } from '../prescribing';
import type { AhaFacts } from './aha-class';
import { ahaClassOf, ahaSource } from './aha-class';
import type { RiskFacts, RiskFinding } from './criteria';
import { riskClasses, riskFindings, riskNumbers, riskSource } from './criteria';
import { monitoringAdvice, monitoringSource } from './monitoring';
import { riskLevelOf, whyNotOverride } from './override';
import { defaultStaffing, staffingNumbers, staffNeeded } from './staffing';
import { stratifyRisk } from './stratify';

const names = Object.keys(riskFindings) as RiskFinding[];

const findingsOf = (value: boolean | null, changes: Partial<RiskFacts['findings']> = {}) => ({
  ...(Object.fromEntries(names.map((name) => [name, value])) as RiskFacts['findings']),
  ...changes,
});

const facts = (
  changes: Partial<RiskFacts['findings']> = {},
  ejectionFraction: number | null = 55,
  capacity: Mets | null = mets(8),
): RiskFacts => ({ findings: findingsOf(false, changes), ejectionFraction, capacity });

const answer = fc.constantFrom(true, false, null);
const someFacts: fc.Arbitrary<RiskFacts> = fc.record({
  findings: fc.record(
    Object.fromEntries(names.map((name) => [name, answer])) as Record<RiskFinding, typeof answer>,
  ),
  ejectionFraction: fc.option(fc.integer({ min: 10, max: 80 })),
  capacity: fc.option(fc.double({ min: 1, max: 15, noNaN: true }).map(mets)),
});

const rank = (riskClass: (typeof riskClasses)[number]) => riskClasses.indexOf(riskClass);

describe('risk', () => {
  it.each(names)('is raised by %s as far as it says', (name) => {
    const { riskClass, because } = stratifyRisk(facts({ [name]: true }));
    expect(riskClass).toBe(riskFindings[name].raises);
    expect(because).toEqual([name]);
  });

  it.each<[number | null, number | null, string, string]>([
    [50, 7, 'low', 'low'],
    [49.9, 7, 'moderate', 'moderate'],
    [40, 7, 'moderate', 'moderate'],
    [39.9, 7, 'high', 'high'],
    [55, 6.9, 'moderate', 'moderate'],
    [55, null, 'undetermined', 'moderate'],
    [45, null, 'moderate', 'moderate'],
    [null, 8, 'undetermined', 'high'],
    [null, 4, 'undetermined', 'high'],
    [35, null, 'high', 'high'],
  ])('EF %s, %s METs: %s, treated as %s', (ejection, capacity, riskClass, treatAs) => {
    const result = stratifyRisk(facts({}, ejection, capacity === null ? null : mets(capacity)));
    expect(result).toMatchObject({ riskClass, treatAs });
  });

  it('is never low while anything is missing, and names what is', () => {
    fc.assert(
      fc.property(someFacts, (given) => {
        const { riskClass, treatAs, missing } = stratifyRisk(given);
        if (missing.length > 0) {
          expect(riskClass).not.toBe('low');
          expect(treatAs).not.toBe('low');
        }
        expect(missing.length).toBe(
          [...Object.values(given.findings), given.ejectionFraction, given.capacity].filter(
            (each) => each === null,
          ).length,
        );
        if (riskClass !== 'undetermined') expect(riskClass).toBe(treatAs);
      }),
    );
  });

  it('is, once everything is known, no worse than what it was treated as', () => {
    fc.assert(
      fc.property(someFacts, someFacts, (given, later) => {
        const filled: RiskFacts = {
          findings: Object.fromEntries(
            names.map((name) => [name, given.findings[name] ?? later.findings[name] ?? true]),
          ) as RiskFacts['findings'],
          ejectionFraction: given.ejectionFraction ?? later.ejectionFraction ?? 30,
          capacity: given.capacity ?? later.capacity ?? mets(3),
        };
        const before = stratifyRisk(given);
        const after = stratifyRisk(filled);
        expect(after.riskClass).not.toBe('undetermined');
        expect(rank(after.treatAs)).toBeLessThanOrEqual(rank(before.treatAs));
        if (before.riskClass !== 'undetermined') expect(after.riskClass).toBe(before.riskClass);
      }),
    );
  });

  it('does not fall when a finding is added', () => {
    fc.assert(
      fc.property(someFacts, fc.constantFrom(...names), (given, name) => {
        const more = { ...given, findings: { ...given.findings, [name]: true } };
        const less = { ...given, findings: { ...given.findings, [name]: false } };
        expect(rank(stratifyRisk(more).treatAs)).toBeGreaterThanOrEqual(
          rank(stratifyRisk(less).treatAs),
        );
      }),
    );
  });

  it('refuses impossible numbers', () => {
    expect(() => stratifyRisk(facts({}, 101))).toThrow(RangeError);
    expect(() => stratifyRisk(facts({}, 55, mets(0)))).toThrow(RangeError);
  });

  it('tells words, unit and source of each criterion', () => {
    expect(riskNumbers.ejectionFraction.unit).toBe('%');
    expect(riskSource).toContain('AACVPR');
    expect(monitoringSource).toContain('memory');
    expect(ahaSource).toContain('Fletcher');
    expect(riskClasses.map((each) => monitoringAdvice[each].sessions.upper)).toEqual([18, 24, 36]);
  });
});

describe('an override', () => {
  const missing = stratifyRisk(facts({}, null));

  it('needs a reason, and never makes what is missing low', () => {
    expect(whyNotOverride(missing, { riskClass: 'moderate', reason: ' ' })).toMatch(/reason/);
    expect(whyNotOverride(missing, { riskClass: 'low', reason: 'fit' })).toMatch(/missing/);
    expect(whyNotOverride(missing, { riskClass: 'moderate', reason: 'echo seen' })).toBeNull();
    expect(whyNotOverride(stratifyRisk(facts()), { riskClass: 'low', reason: 'x' })).toMatch(
      /by the criteria/,
    );
  });

  it('leads to the level of a prescription', () => {
    expect(riskLevelOf(missing, null)).toBe('unknown');
    expect(riskLevelOf(missing, { riskClass: 'low', reason: 'fit' })).toBe('unknown');
    expect(riskLevelOf(missing, { riskClass: 'high', reason: 'known to us' })).toBe('high');
    expect(riskLevelOf(stratifyRisk(facts()), null)).toBe('low');
  });
});

describe('the AHA class', () => {
  const stable: AhaFacts = {
    unstable: false,
    knownDisease: true,
    nyha: 2,
    ejectionFraction: 45,
    capacity: mets(6),
    priorInfarctions: 1,
    ischemiaAtLowWork: false,
    pressureFallAtLowWork: false,
    priorArrest: false,
    seriousArrhythmia: false,
  };

  it.each<[Partial<AhaFacts>, string | null, string]>([
    [{}, 'B', 'B'],
    [{ knownDisease: false }, 'A', 'A'],
    [{ knownDisease: null }, null, 'B'],
    [{ unstable: true }, 'D', 'D'],
    [{ unstable: null, nyha: 4 }, null, 'D'],
    [{ nyha: 3 }, 'C', 'C'],
    [{ capacity: mets(5.9) }, 'C', 'C'],
    [{ ejectionFraction: 30 }, 'C', 'C'],
    [{ priorInfarctions: 2 }, 'C', 'C'],
    [{ capacity: null }, null, 'C'],
    [{ capacity: null, priorArrest: true }, 'C', 'C'],
  ])('%o: %s, treated as %s', (changes, ahaClass, treatAs) => {
    expect(ahaClassOf({ ...stable, ...changes })).toEqual({ ahaClass, treatAs });
  });
});

describe('staff', () => {
  const of = (count: number, risk: RiskLevel) => Array<RiskLevel>(count).fill(risk);

  it.each<[RiskLevel[], number]>([
    [[], 0],
    [of(1, 'low'), 2],
    [of(10, 'moderate'), 2],
    [of(11, 'moderate'), 3],
    [of(6, 'high'), 2],
    [of(7, 'high'), 3],
    [[...of(3, 'unknown'), ...of(5, 'low')], 2],
    [[...of(6, 'high'), ...of(4, 'low')], 3],
  ])('for %o: %i', (risks, staff) => {
    expect(staffNeeded(risks, defaultStaffing)).toBe(staff);
  });

  it('is set within bounds, each with a source', () => {
    const numbers: PolicyNumbers = staffingNumbers;
    expect(policyFaults(numbers, defaultStaffing)).toEqual([]);
    expect(policyFaults(numbers, { patientsEach: 2, highRiskEach: 'x' })).toEqual([
      'patientsEach',
      'highRiskEach',
      'leastStaff',
    ]);
    for (const { key, source, lowest, highest, default: value } of policyKeysOf(
      'staffing',
      numbers,
    )) {
      expect(key).toMatch(/^staffing\./);
      expect(source).not.toBe('');
      expect(value).toBeGreaterThanOrEqual(lowest);
      expect(value).toBeLessThanOrEqual(highest);
    }
  });
});
