const practice = 'Common practice';
const rules = 'The prescription’s own limits';
const statement = 'AACVPR statement on progression 2018: duration before intensity, one at a time';

/** Why a step is proposed, in words for the floor, each with its source. */
export const progressionReasons = {
  'no-session': ['There is no signed session yet.', practice],
  withdrawn: ['The range was withdrawn: a new one comes first.', rules],
  'stop-caution': ['A caution of the prescription says stop: settle it first.', rules],
  'over-ceiling': ['A rate passed the ceiling.', rules],
  'over-ask-line': ['A rate passed the ask line, and no ceiling is known.', rules],
  'over-pressure': ['Blood pressure passed its ceiling.', rules],
  'under-oxygen': ['Oxygen saturation fell under its floor.', rules],
  symptom: ['A symptom was recorded that may come from the heart.', practice],
  'minor-symptom': ['Breathlessness, leg pain or unusual fatigue was recorded.', practice],
  'repeated-trouble': ['The same trouble came in session after session.', practice],
  'lowest-setting': ['No easier setting lies in the range of the machine’s equation.', rules],
  'over-work-ceiling': ['The work lies above the work ceiling.', rules],
  'over-work-target': ['The work lies above the work that is prescribed.', rules],
  'rate-above': ['The rate was above the range for most of the session.', rules],
  'effort-above': ['Effort was above the prescribed for most of the session.', rules],
  'one-rate-above': ['A rate was above the range.', rules],
  'one-effort-above': ['Effort was above the prescribed once.', rules],
  'not-recorded': ['Too little was recorded to raise anything.', practice],
  'symptoms-not-asked': [
    'Nobody wrote down whether there were symptoms: ask, and tap None.',
    practice,
  ],
  'dose-missed': ['A dose was missed that day: the rates do not compare.', rules],
  'new-prescription': ['The prescription has changed since.', practice],
  'few-sessions': ['Too few sessions at this work so far.', statement],
  'work-changed': ['The work changed between these sessions.', statement],
  'earlier-trouble': ['One of the last sessions was not clean.', practice],
  'after-absence': ['The patient was away for long: the same work first.', practice],
  'work-ceiling-unknown': ['A threshold is known, but not the work at which it comes.', rules],
  'arm-limit-unknown': ['No limit is known for the arms.', rules],
  'rate-and-effort-disagree': [
    'The rate is below the range, but effort is at its upper end: effort rules.',
    rules,
  ],
  'equation-range': ['The work of this setting cannot be told by an equation.', rules],
  'at-limit': ['The prescribed work or a ceiling is reached.', rules],
  'no-room': ['The machine has no step that is small enough.', rules],
  'in-range': ['The session went as prescribed.', rules],
  'duration-first': ['In range and clean: longer comes before harder.', statement],
  'below-range': ['The rate stayed below the range, with effort to spare.', rules],
  'easy-in-range': ['In range, long enough, and with effort to spare.', statement],
} as const satisfies Readonly<Record<string, readonly [text: string, source: string]>>;
export type ProgressionReasonCode = keyof typeof progressionReasons;
