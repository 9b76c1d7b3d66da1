import type { RateActingDrug } from '../prescribing/request';

/** What staff must know of a drug before exercise, beside its action on the heart rate. */
export const drugFlags = ['anticoagulant', 'nitrate', 'glucose-lowering'] as const;
/** `glucose-lowering`: insulin or a secretagogue, which can cause hypoglycemia in exercise. */
export type DrugFlag = (typeof drugFlags)[number];

export const drugFlagWords: Readonly<Record<DrugFlag, string>> = {
  anticoagulant: 'Anticoagulant: bruises and bleeds',
  nitrate: 'Nitrate',
  'glucose-lowering': 'Insulin or secretagogue: low glucose in exercise',
};

export const dosingTimes = ['morning', 'noon', 'evening', 'bedtime', 'as-needed'] as const;
export type DosingTime = (typeof dosingTimes)[number];

/** A generic name with what it does, as far as exercise is concerned. */
export interface GenericDrug {
  readonly name: string;
  readonly drugClass: string;
  /** Null: does not act on the heart rate in a way that the rules know. */
  readonly rateActing: RateActingDrug | null;
  readonly flags: readonly DrugFlag[];
  readonly salts: readonly string[];
}
