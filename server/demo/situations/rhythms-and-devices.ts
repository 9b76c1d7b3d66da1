import { breathTested, situation, tested, walked } from './facts';

/** One person each: what drives the heart, and what watches it. */
export const rhythmSituations = [
  situation('Sinus node drives a pacemaker, tracking limit near the range', 'valve', {
    rhythm: 'sinus-tracked',
    upperTrackingRate: 120,
    seated: 68,
    test: tested(118, 5.9),
  }),
  situation('Sensor-paced, tested with this sensor', 'heart-attack', {
    rhythm: 'sensor-paced',
    pacemaker: true,
    seated: 62,
    test: tested(112, 5.2),
    ages: [68, 84],
  }),
  situation('Sensor-paced, never tested', 'bypass', {
    rhythm: 'sensor-paced',
    pacemaker: true,
    seated: 60,
    walkTest: walked(330),
    ages: [70, 86],
  }),
  situation('Paced at a fixed rate', 'valve', {
    rhythm: 'fixed-paced',
    pacemaker: true,
    seated: 70,
    spread: 0,
    rateActingDrugs: [],
    walkTest: walked(312),
    ages: [72, 88],
  }),
  situation('Atrial fibrillation, tested: peak VO2 counts, the rate does not', 'stent', {
    rhythm: 'atrial-fibrillation',
    seated: 74,
    spread: 8,
    test: breathTested(142, 16.1),
    rateActingDrugs: ['beta-blocker', 'digoxin'],
  }),
  situation('Atrial flutter', 'valve', {
    rhythm: 'atrial-flutter',
    seated: 76,
    walkTest: walked(344),
    rateActingDrugs: ['diltiazem-verapamil', 'digoxin'],
  }),
  situation('Frequent ectopy', 'heart-failure', {
    rhythm: 'frequent-ectopy',
    risk: 'high',
    rateActingDrugs: ['beta-blocker', 'amiodarone-sotalol'],
    test: tested(124, 5.1, { endedBy: 'arrhythmia' }),
    thresholds: [{ kind: 'arrhythmia', heartRate: 116, clearMets: 3.9 }],
  }),
  situation('High-grade block, pacemaker planned', 'other', {
    rhythm: 'high-grade-block',
    seated: 46,
    standing: 48,
    rateActingDrugs: [],
    walkTest: walked(298),
    risk: 'high',
  }),
  situation('ICD, a monitor zone is the lowest', 'heart-failure', {
    risk: 'high',
    test: tested(122, 5.6),
    icd: {
      status: 'present',
      zones: [
        { rate: 130, kind: 'monitor' },
        { rate: 182, kind: 'pacing' },
        { rate: 210, kind: 'shock' },
      ],
    },
  }),
  situation('ICD, slow shock zone binds', 'heart-failure', {
    risk: 'high',
    seated: 64,
    test: breathTested(121, 15.2),
    icd: { status: 'present', zones: [{ rate: 118, kind: 'shock' }] },
  }),
  situation('ICD, pacing zone alone', 'heart-attack', {
    risk: 'high',
    test: tested(126, 6),
    icd: { status: 'present', zones: [{ rate: 167, kind: 'pacing' }] },
  }),
  situation('ICD whose zones nobody has read yet', 'heart-failure', {
    risk: 'high',
    test: tested(119, 5),
    icd: { status: 'present', zones: [] },
  }),
  situation('A scar under the collarbone: ICD not known', 'other', {
    walkTest: walked(365),
    icd: { status: 'unknown', zones: [] },
    measured: false,
    risk: 'unknown',
  }),
  situation('Device reprogrammed since the test', 'heart-failure', {
    rhythm: 'sinus-tracked',
    upperTrackingRate: 130,
    risk: 'high',
    test: tested(117, 4.7, { sameRhythmAndDevice: false, daysAgo: 60 }),
    icd: { status: 'present', zones: [{ rate: 190, kind: 'shock' }] },
  }),
];

/** One person each: conditions under which the rate means something else, or nothing. */
export const conditionSituations = [
  situation('Transplant, nerves grown back and tested', 'transplant', {
    seated: 84,
    rateActingDrugs: [],
    conditions: { transplant: 'recovered' },
    test: breathTested(148, 21.5),
    ages: [35, 62],
  }),
  situation('Transplant, nerves grown back, no test since', 'transplant', {
    seated: 86,
    rateActingDrugs: [],
    conditions: { transplant: 'recovered' },
    walkTest: walked(448),
    ages: [35, 62],
  }),
  situation('Transplant, tested while denervated', 'transplant', {
    seated: 98,
    standing: 100,
    rateActingDrugs: [],
    test: breathTested(131, 16.4),
    risk: 'high',
    ages: [30, 64],
  }),
  situation('Assist device with an ICD', 'assist-device', {
    seated: 86,
    risk: 'high',
    walkTest: walked(284),
    icd: { status: 'present', zones: [{ rate: 210, kind: 'shock' }] },
    ages: [38, 66],
  }),
  situation('Chronotropic incompetence', 'stent', {
    seated: 58,
    conditions: { chronotropicIncompetence: true },
    test: tested(92, 4.9),
  }),
  situation('Autonomic neuropathy after long diabetes', 'bypass', {
    seated: 88,
    standing: 90,
    conditions: { autonomicNeuropathy: true },
    test: tested(129, 5.8),
  }),
  situation('Autonomic neuropathy, walked alone', 'stent', {
    seated: 90,
    standing: null,
    rateActingDrugs: [],
    conditions: { autonomicNeuropathy: true },
    walkTest: walked(356),
  }),
  situation('Pulmonary hypertension', 'other', {
    seated: 80,
    rateActingDrugs: [],
    conditions: { pulmonaryHypertension: true },
    test: breathTested(126, 13.1, { mode: 'cycle', endedBy: 'dyspnea' }),
    risk: 'high',
    sex: 'female',
    ages: [34, 68],
  }),
  situation('Coronary dissection', 'heart-attack', {
    seated: 68,
    conditions: { dissection: true },
    test: tested(138, 8.8),
    sex: 'female',
    ages: [36, 54],
  }),
  situation('Claudication ended the test', 'bypass', {
    conditions: { peripheralArteryDisease: true },
    test: tested(106, 3.9, { endedBy: 'claudication' }),
    walkTest: walked(262),
  }),
  situation('Arm test, since the legs give way first', 'stent', {
    conditions: { peripheralArteryDisease: true },
    test: tested(114, 3.8, { mode: 'arm' }),
    walkTest: walked(240),
  }),
  situation('Outflow obstruction: a physician sets all', 'other', {
    conditions: { outflowObstruction: true },
    test: tested(128, 6.1),
    risk: 'high',
    ages: [28, 60],
  }),
  situation('Heart failure not yet classed', 'heart-attack', {
    seated: 77,
    conditions: { heartFailure: 'unknown' },
    walkTest: walked(305),
    risk: 'unknown',
  }),
  situation('Heart failure, mildly reduced', 'heart-failure', {
    conditions: { heartFailure: 'mildly-reduced' },
    rateActingDrugs: ['beta-blocker', 'ivabradine'],
    walkTest: walked(388),
  }),
];
