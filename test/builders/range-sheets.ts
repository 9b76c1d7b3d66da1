import type { PrescriptionFact } from '@shared/clinical/prescribing/effect-of-fact';
import type { Sheet } from '../../server/prescriptions/range-sheet';

/** A fact that puts a range out of force. */
export const changed = (fact: PrescriptionFact) => ({
  fact,
  effect: 'withdrawn' as const,
  at: '2026-12-01T15:00:00.000Z',
});

/** What a patient is told of the worked example, with changes. */
export const sheetOf = (range: Partial<Sheet['range']> = {}, more: Partial<Sheet> = {}): Sheet => ({
  program: 'Harbor Lane',
  patient: 'Ada Ferreira',
  site: { name: 'Quayside', phone: '(555) 010-0142', timeZone: 'America/New_York' },
  home: { perWeek: 2, warmUpMinutes: 10, coolDownMinutes: 10 },
  ...more,
  range: {
    state: 'in-force',
    changes: [],
    target: { lower: 91, upper: 105 },
    tenSecondCount: { lower: 16, upper: 17 },
    stayUnder: 108,
    resting: 62,
    effort: { lower: 11, upper: 14 },
    hasDefibrillator: false,
    cautions: ['ceiling-below-intensity', 'defer-to-local-policy'],
    setOn: '2026-12-01T15:00:00.000Z',
    setBy: 'I. Brandt',
    signedBy: 'M. Okafor, MD',
    ...range,
  },
});

/** Everything that a sheet can hold at once, with names as long as the record takes. */
export const fullSheet = (): Sheet =>
  sheetOf(
    {
      state: 'review',
      changes: [
        changed('rate-acting-drug-raised'),
        changed('rhythm-changed'),
        changed('device-changed'),
        changed('threshold-added'),
        changed('cardiac-event'),
        changed('procedure'),
        changed('syncope'),
      ],
      hasDefibrillator: true,
      cautions: [
        'icd-rate-unknown',
        'physician-sets',
        'no-valid-range',
        'estimated-maximum',
        'icd-present',
        'tracking-limit',
        'heart-rate-unreliable',
        'silent-ischemia-possible',
        'claudication-leads',
        'pressure-ceiling',
        'oxygen-floor',
        'low-capacity',
      ],
      setBy: 'Bartholomew Featherstonehaugh-Cholmondeley the Younger',
      signedBy: 'Wilhelmina Konstantinopolitańczykowianeczka-Żółkiewska, MD, PhD',
    },
    {
      patient: 'Maria Concepción Hernández-Villanueva y Rodríguez de la Fuente-Žižkova',
      program: 'Harbor Lane Program of Cardiac Rehabilitation and Exercise Medicine',
      site: {
        name: 'The Old Ropewalk at the Northern Quay, second building',
        phone: '(555) 010-0142 extension 20417',
        timeZone: 'America/New_York',
      },
    },
  );
