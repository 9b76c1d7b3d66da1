import { breathTested, situation, tested, walked } from './facts';

/** The person who holds the patient's account. */
export const accountSituation = situation(
  'The patient’s account: ischemia sets a ceiling',
  'stent',
  {
    seated: 64,
    test: breathTested(136, 22.4, { endedBy: 'st-change' }),
    thresholds: [{ kind: 'ischemia', heartRate: 122, clearMets: null }],
    sex: 'female',
    ages: [61, 61],
  },
);

/** Those who fill most classes; their numbers are varied a little from person to person. */
export const usualSituations = [
  situation(
    'Heart attack, beta blocker, treadmill test',
    'heart-attack',
    { seated: 64, test: tested(131, 7.4) },
    16,
  ),
  situation(
    'Stent, beta blocker, treadmill test',
    'stent',
    { seated: 63, test: tested(134, 8.2), risk: 'low' },
    14,
  ),
  situation(
    'Stent, no drug that acts on the rate',
    'stent',
    { seated: 71, rateActingDrugs: [], test: tested(152, 9.1), risk: 'low', ages: [44, 70] },
    8,
  ),
  situation(
    'Bypass, walked, not yet tested',
    'bypass',
    { seated: 76, walkTest: walked(372), spread: 6 },
    12,
  ),
  situation(
    'Heart attack, walked, not yet tested',
    'heart-attack',
    { seated: 70, walkTest: walked(401) },
    9,
  ),
  situation(
    'Valve, cycle test',
    'valve',
    { seated: 70, test: breathTested(128, 17.6, { mode: 'cycle' }) },
    8,
  ),
  situation(
    'Stable angina, ischemia on the treadmill',
    'stable-angina',
    {
      seated: 62,
      test: tested(128, 6.2, { endedBy: 'st-change' }),
      thresholds: [{ kind: 'ischemia', heartRate: 119, clearMets: 4.8 }],
    },
    8,
  ),
  situation(
    'Heart failure, beta blocker, ICD with known zones',
    'heart-failure',
    {
      seated: 68,
      risk: 'high',
      test: breathTested(118, 14.8, { endedBy: 'dyspnea' }),
      icd: {
        status: 'present',
        zones: [
          { rate: 176, kind: 'pacing' },
          { rate: 200, kind: 'shock' },
        ],
      },
      ages: [46, 76],
    },
    8,
  ),
  situation(
    'Heart failure in atrial fibrillation',
    'heart-failure',
    {
      seated: 78,
      spread: 9,
      risk: 'high',
      rhythm: 'atrial-fibrillation',
      rateActingDrugs: ['beta-blocker', 'digoxin'],
      walkTest: walked(318),
      ages: [60, 84],
    },
    6,
  ),
  situation(
    'Heart failure with preserved ejection fraction',
    'heart-failure',
    {
      seated: 72,
      conditions: { heartFailure: 'preserved' },
      rateActingDrugs: ['diltiazem-verapamil'],
      test: tested(126, 5.4, { endedBy: 'dyspnea' }),
      sex: 'female',
      ages: [62, 84],
    },
    5,
  ),
  situation(
    'Valve, walked, not yet tested',
    'valve',
    { seated: 74, walkTest: walked(348), ages: [60, 84] },
    4,
  ),
  situation(
    'Transplant, nerves not grown back',
    'transplant',
    {
      seated: 96,
      standing: 99,
      rateActingDrugs: [],
      walkTest: walked(355),
      risk: 'high',
      ages: [28, 66],
    },
    2,
  ),
  situation(
    'Assist device',
    'assist-device',
    {
      seated: 84,
      risk: 'high',
      walkTest: walked(296),
      icd: { status: 'present', zones: [{ rate: 200, kind: 'shock' }] },
    },
    1,
  ),
];
