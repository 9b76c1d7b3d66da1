import { mets } from '../../units';
import type { RiskLevel } from '../prescribing/request';
import type { RiskFacts, RiskFinding } from './criteria';
import { riskLevelOf, whyNotOverride } from './override';
import type { Stratification } from './stratify';
import { stratifyRisk } from './stratify';

/** A stratification as the record keeps it. */
export interface RecordedRisk {
  readonly findings: Readonly<Record<RiskFinding, boolean | null>>;
  /** Percent. */
  readonly ejectionFraction: number | null;
  /** METs. */
  readonly capacity: number | null;
  readonly level: RiskLevel;
  readonly overrideReason: string | null;
}

const factsOf = ({ findings, ejectionFraction, capacity }: RecordedRisk): RiskFacts => ({
  findings,
  ejectionFraction,
  capacity: capacity === null ? null : mets(capacity),
});

/** What the criteria of an entry come to. */
export const stratificationOf = (risk: RecordedRisk): Stratification => stratifyRisk(factsOf(risk));

/** Why an entry's level does not stand beside its criteria; null when it does. Missing criteria never make low. */
export function whyNotRecordedRisk(
  risk: RecordedRisk,
): { readonly path: 'level' | 'overrideReason'; readonly message: string } | null {
  const stratification = stratificationOf(risk);
  const { level, overrideReason } = risk;
  const byCriteria = riskLevelOf(stratification, null);
  if (level === byCriteria) {
    return overrideReason === null
      ? null
      : { path: 'overrideReason', message: 'This is the class by the criteria' };
  }
  if (level === 'unknown') return { path: 'level', message: 'The criteria give a class' };
  const message = whyNotOverride(stratification, {
    riskClass: level,
    reason: overrideReason ?? '',
  });
  if (message === null) return null;
  return { path: overrideReason === null && level !== 'low' ? 'overrideReason' : 'level', message };
}
