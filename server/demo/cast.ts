import { patientAccount } from './accounts';
import type { SiteKey } from './accounts';
import type { Fate } from './fates';

/** A person whose place in the story is set, so that on the first day somebody stands at each step of it. */
export interface CastMember {
  readonly name?: { readonly givenName: string; readonly familyName: string };
  readonly email?: string;
  readonly site?: SiteKey;
  readonly sex?: 'female' | 'male';
  readonly situation?: string;
  /** Days from the first day; 0 is that day. */
  readonly enrolled?: number;
  readonly fate?: Partial<Fate>;
}

const stays = { leaves: null, gap: null, startsAfter: 4, plannedSessions: 36 } as const;

/** Who holds the patient's account. */
export const patientAccountIndex = 134;

/** By the place in the order of arrival. */
export const cast: ReadonlyMap<number, CastMember> = new Map<number, CastMember>([
  [
    patientAccountIndex,
    {
      name: { givenName: patientAccount.givenName, familyName: patientAccount.familyName },
      email: patientAccount.email,
      site: 'quayside',
      situation: 'The patient’s account: ischemia sets a ceiling',
      enrolled: -37,
      fate: { ...stays, pace: 2, reliability: 0.93, maintenance: true, turn: null },
    },
  ],
  // A couple with one mailbox: neither can have an account by it.
  [
    140,
    {
      name: { givenName: 'Ottilie', familyName: 'Kallioniemi' },
      email: 'the.kallioniemis@mail.example',
      sex: 'female',
      site: 'quayside',
      situation: 'Valve, walked, not yet tested',
    },
  ],
  [
    141,
    {
      name: { givenName: 'Sigurd', familyName: 'Kallioniemi' },
      email: 'the.kallioniemis@mail.example',
      sex: 'male',
      site: 'quayside',
      situation: 'Bypass, walked, not yet tested',
    },
  ],
  // A dose raised yesterday: the range in force no longer rests on today's drugs.
  [
    120,
    {
      site: 'quayside',
      situation: 'Heart attack, beta blocker, treadmill test',
      enrolled: -45,
      fate: { ...stays, pace: 3, reliability: 1, turn: { kind: 'dose raised', afterDays: 44 } },
    },
  ],
  // On hold today.
  [
    125,
    {
      site: 'mill-street',
      situation: 'Bypass, walked, not yet tested',
      enrolled: -40,
      fate: { ...stays, pace: 3, reliability: 1, gap: { after: 12, days: 30, closed: false } },
    },
  ],
  // Seen today or yesterday: a draft, one that waits for the physician, one at each site.
  [
    163,
    {
      site: 'quayside',
      situation: 'Stent, beta blocker, treadmill test',
      enrolled: -1,
      fate: { ...stays, signing: { physiologist: 2, physician: 1 } },
    },
  ],
  [
    164,
    {
      site: 'quayside',
      situation: 'Heart failure, beta blocker, ICD with known zones',
      enrolled: -1,
      fate: { ...stays, signing: { physiologist: 0, physician: 2 } },
    },
  ],
  [
    165,
    {
      site: 'mill-street',
      situation: 'Stable angina, ischemia on the treadmill',
      enrolled: -2,
      fate: { ...stays, startsAfter: 6, signing: { physiologist: 0, physician: 4 } },
    },
  ],
  // A second event: the first course closed, another began.
  [
    86,
    {
      site: 'quayside',
      situation: 'Stent, beta blocker, treadmill test',
      enrolled: -84,
      fate: { ...stays, pace: 3, leaves: { after: 14, reason: 'new event' } },
    },
  ],
  // Died, moved, came back after closing, reached a smaller plan, never came.
  [30, { fate: { ...stays, leaves: { after: 9, reason: 'died' } } }],
  [41, { fate: { ...stays, leaves: { after: 20, reason: 'moved away' } } }],
  [52, { fate: { ...stays, gap: { after: 8, days: 50, closed: true } } }],
  [64, { fate: { ...stays, plannedSessions: 18, pace: 2 } }],
  [70, { fate: { startsAfter: null } }],
  // Discharged before the physician had signed: the first range is put aside.
  [
    76,
    {
      fate: {
        ...stays,
        pace: 3,
        reliability: 1,
        leaves: { after: 1, reason: 'medical discharge' },
        signing: { physiologist: 0, physician: 12 },
      },
    },
  ],
]);
