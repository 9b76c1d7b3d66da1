import type { Mets } from '../../units';
import type { RiskClass, RiskCriterion, RiskFacts, RiskFinding } from './criteria';
import { riskClasses, riskFindings } from './criteria';

/** What one criterion says: a class, or that it is missing and could raise the risk as far as `couldRaiseTo`. */
export type CriterionState =
  | { readonly criterion: RiskCriterion; readonly state: 'known'; readonly saysClass: RiskClass }
  | {
      readonly criterion: RiskCriterion;
      readonly state: 'missing';
      readonly couldRaiseTo: Exclude<RiskClass, 'low'>;
    };

export interface Stratification {
  /** `undetermined` whenever a missing criterion could still raise the class. */
  readonly riskClass: RiskClass | 'undetermined';
  /** The class to work by: the worst that what is missing leaves open. Never low with a criterion missing. */
  readonly treatAs: RiskClass;
  readonly criteria: readonly CriterionState[];
  /** The criteria that made the class what it is, for the screen. */
  readonly because: readonly RiskCriterion[];
  readonly missing: readonly RiskCriterion[];
}

const rank = (riskClass: RiskClass): number => riskClasses.indexOf(riskClass);

const worst = (classes: readonly RiskClass[]): RiskClass =>
  classes.reduce<RiskClass>((a, b) => (rank(b) > rank(a) ? b : a), 'low');

/** 50 % and above low, 40 to below 50 moderate, below 40 high. */
const classOfEjection = (percent: number): RiskClass =>
  percent < 40 ? 'high' : percent < 50 ? 'moderate' : 'low';

/** 7 METs and above low; less is moderate: 5–6.9 fits neither wording, and low asks for all low features. */
const classOfCapacity = (capacity: Mets): RiskClass => (capacity < 7 ? 'moderate' : 'low');

const known = (criterion: RiskCriterion, saysClass: RiskClass): CriterionState => ({
  criterion,
  state: 'known',
  saysClass,
});

function numberState<N extends number>(
  criterion: RiskCriterion,
  value: N | null,
  classOf: (value: N) => RiskClass,
  couldRaiseTo: Exclude<RiskClass, 'low'>,
): CriterionState {
  return value === null
    ? { criterion, state: 'missing', couldRaiseTo }
    : known(criterion, classOf(value));
}

function findingState(finding: RiskFinding, isThere: boolean | null): CriterionState {
  const { raises } = riskFindings[finding];
  if (isThere === null) return { criterion: finding, state: 'missing', couldRaiseTo: raises };
  return known(finding, isThere ? raises : 'low');
}

function statesOf({ findings, ejectionFraction, capacity }: RiskFacts): CriterionState[] {
  const names = Object.keys(riskFindings) as RiskFinding[];
  return [
    ...names.map((name) => findingState(name, findings[name])),
    numberState('ejectionFraction', ejectionFraction, classOfEjection, 'high'),
    numberState('capacity', capacity, classOfCapacity, 'moderate'),
  ];
}

/**
 * Stratifies the risk of an event during exercise: high with any high feature, low with all low features, else moderate. What is
 * missing never counts as low: while it could raise the class, the class is undetermined, and the patient is treated as the
 * worst that is left open.
 * @throws RangeError for an ejection fraction outside 0–100 or a capacity not above 0
 * @see riskSource in criteria.ts
 */
export function stratifyRisk(facts: RiskFacts): Stratification {
  const { ejectionFraction, capacity } = facts;
  if (ejectionFraction !== null && !(ejectionFraction >= 0 && ejectionFraction <= 100)) {
    throw new RangeError('ejection fraction: 0 to 100 %');
  }
  if (capacity !== null && !(capacity > 0)) throw new RangeError('capacity: above 0 METs');
  const criteria = statesOf(facts);
  const said = worst(criteria.map((each) => (each.state === 'known' ? each.saysClass : 'low')));
  const open = worst(
    criteria.map((each) => (each.state === 'missing' ? each.couldRaiseTo : 'low')),
  );
  const treatAs = worst([said, open]);
  return {
    riskClass: treatAs === said ? said : 'undetermined',
    treatAs,
    criteria,
    because: criteria.flatMap((each) =>
      each.state === 'known' && each.saysClass === said && said !== 'low' ? [each.criterion] : [],
    ),
    missing: criteria.flatMap((each) => (each.state === 'missing' ? [each.criterion] : [])),
  };
}
