import { breathTested, situation, tested, walked } from './facts';

/** One person each: what slows or hurries the heart. */
export const drugSituations = [
  situation('Drugs not gone through yet', 'stent', {
    rateActingDrugs: null,
    test: tested(133, 7, { sameRateActingDrugs: false }),
  }),
  situation('Drugs not gone through, walked alone', 'other', {
    rateActingDrugs: null,
    walkTest: walked(377),
    sex: 'unknown',
    risk: 'low',
  }),
  situation('Ivabradine beside a beta blocker', 'heart-failure', {
    seated: 61,
    rateActingDrugs: ['beta-blocker', 'ivabradine'],
    test: breathTested(112, 15.6),
    risk: 'high',
  }),
  situation('Diltiazem for angina', 'stable-angina', {
    rateActingDrugs: ['diltiazem-verapamil'],
    test: tested(127, 6.3, { endedBy: 'angina' }),
    thresholds: [{ kind: 'angina', heartRate: 121, clearMets: 5.1 }],
  }),
  situation('Amiodarone after a rhythm storm', 'bypass', {
    rateActingDrugs: ['amiodarone-sotalol', 'beta-blocker'],
    test: tested(119, 5.7),
    risk: 'high',
  }),
  situation('Thyroid hormone, dose being found', 'valve', {
    seated: 79,
    rateActingDrugs: ['thyroid-hormone'],
    test: tested(146, 7.7),
    sex: 'female',
  }),
  situation('Another drug that slows the rate', 'stent', {
    seated: 60,
    rateActingDrugs: ['other'],
    walkTest: walked(420),
  }),
  situation('Beta blocker raised after the test', 'heart-attack', {
    seated: 60,
    test: tested(138, 7.1, { sameRateActingDrugs: false, daysAgo: 34 }),
    walkTest: walked(415),
  }),
];

/** One person each: which test stands, and which does not. */
export const testSituations = [
  situation('Test older than the policy allows', 'stent', {
    test: tested(136, 7.9, { daysAgo: 204 }),
  }),
  situation('Second stent since the test', 'stent', {
    test: tested(133, 6.8, { eventSince: true, daysAgo: 75 }),
  }),
  situation('Test stopped at a target rate', 'heart-attack', {
    test: tested(120, 6.5, { endedBy: 'target-rate' }),
  }),
  situation('Test at the end of its protocol', 'heart-attack', {
    test: tested(117, 5, { endedBy: 'protocol-end' }),
  }),
  situation('Test stopped by a sore knee', 'bypass', {
    test: tested(110, 4.2, { endedBy: 'orthopedic' }),
    walkTest: walked(340),
  }),
  situation('Test stopped when the power failed', 'stent', {
    test: tested(124, 5.8, { endedBy: 'other' }),
  }),
  situation('Test stopped by a falling blood pressure', 'heart-attack', {
    test: tested(125, 5.5, { endedBy: 'blood-pressure' }),
    thresholds: [{ kind: 'blood-pressure', heartRate: 120, clearMets: 4.4 }],
    risk: 'high',
  }),
  situation('Breathless at the end, cycle', 'valve', {
    test: breathTested(124, 15.9, { mode: 'cycle', endedBy: 'dyspnea', restingHeartRate: 72 }),
  }),
  situation('Peak rate known, work not written down', 'stent', { test: tested(129, null) }),
  situation('Capacity under 3 METs', 'heart-failure', {
    seated: 74,
    risk: 'high',
    test: breathTested(108, 9.6, { endedBy: 'dyspnea' }),
    ages: [66, 84],
  }),
  situation('Reserve too small to work by', 'heart-failure', {
    seated: 78,
    risk: 'high',
    test: breathTested(99, 12.2, { endedBy: 'dyspnea' }),
    ages: [66, 84],
  }),
  situation('Resting rate that will not settle', 'heart-attack', {
    spread: 18,
    test: tested(128, 6.4),
  }),
  situation('Resting rate read only once', 'stent', {
    spread: null,
    standing: null,
    test: tested(131, 7.2),
  }),
];

/** One person each: at which rate a sign began, and what the ceiling leaves. */
export const thresholdSituations = [
  situation('Ischemia, no work written beside it', 'stable-angina', {
    test: tested(132, 6.9, { endedBy: 'st-change' }),
    thresholds: [{ kind: 'ischemia', heartRate: 121, clearMets: null }],
  }),
  situation('Angina, no work written beside it', 'stable-angina', {
    test: tested(124, 5.6, { endedBy: 'angina' }),
    thresholds: [{ kind: 'angina', heartRate: 115, clearMets: null }],
  }),
  situation('Arrhythmia above a rate', 'heart-attack', {
    test: tested(139, 8, { endedBy: 'arrhythmia' }),
    thresholds: [{ kind: 'arrhythmia', heartRate: 130, clearMets: null }],
    risk: 'high',
  }),
  situation('Dizzy above a rate, and ischemia', 'bypass', {
    test: tested(130, 6.6, { endedBy: 'st-change' }),
    thresholds: [
      { kind: 'ischemia', heartRate: 124, clearMets: 5.2 },
      { kind: 'symptom', heartRate: 118, clearMets: 4.6 },
    ],
  }),
  situation('Blood pressure falls early, found on the floor', 'other', {
    walkTest: walked(322),
    thresholds: [{ kind: 'blood-pressure', heartRate: 112, clearMets: null }],
    risk: 'high',
  }),
  situation('Ceiling leaves no range', 'stable-angina', {
    seated: 72,
    test: tested(126, 5.2, { endedBy: 'st-change' }),
    thresholds: [{ kind: 'ischemia', heartRate: 98, clearMets: 2.9 }],
    risk: 'high',
  }),
  situation('Old ischemia still binds after an older test', 'stable-angina', {
    test: tested(129, 6.1, { endedBy: 'st-change', daysAgo: 240 }),
    thresholds: [{ kind: 'ischemia', heartRate: 117, clearMets: 4.7 }],
  }),
];
