import type { RiskFacts, RiskFinding } from '@shared/clinical/risk/criteria';
import { riskFindings } from '@shared/clinical/risk/criteria';
import { stratifyRisk } from '@shared/clinical/risk/stratify';
import type { Mets } from '@shared/units';

const findingsOf = (value: boolean | null) =>
  Object.fromEntries(
    (Object.keys(riskFindings) as RiskFinding[]).map((name) => [name, value]),
  ) as RiskFacts['findings'];

/** A patient with these numbers and nothing else to find. */
export const riskOf = (ejectionFraction: number, capacity: Mets) =>
  stratifyRisk({ findings: findingsOf(false), ejectionFraction, capacity });

/** A patient of whom nothing is known. */
export const riskOfNothingKnown = () =>
  stratifyRisk({ findings: findingsOf(null), ejectionFraction: null, capacity: null });
