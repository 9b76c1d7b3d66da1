import type { LoadLineFacts, LoadLineSize, RateRange } from './load-line-facts';

function rangeWords({ lower, upper }: RateRange): string {
  return `${lower} to ${upper} beats a minute`;
}

function forStaff(facts: LoadLineFacts): (string | false)[] {
  const { target, guide, ceiling, askLine, resting, marker, ticks } = facts;
  return [
    target ? `Target ${rangeWords(target)}.` : 'No heart-rate target: effort leads.',
    guide !== null && `As a guide ${rangeWords(guide)}.`,
    ceiling
      ? `Ceiling ${ceiling.value}${ceiling.reason && `: ${ceiling.reason}`}.`
      : 'No ceiling is known.',
    askLine !== null && `Ask at ${askLine}.`,
    resting !== null && `Resting ${resting}.`,
    marker !== null && `${marker.label}: ${marker.value}.`,
    ticks.length > 0 &&
      `Upper end by other methods: ${ticks.map(({ label, value }) => `${label} ${value}`).join(', ')}.`,
  ];
}

function forPatient({
  target,
  guide,
  ceiling,
  resting,
  marker,
}: LoadLineFacts): (string | false)[] {
  return [
    target
      ? `Your range is ${rangeWords(target)}.`
      : 'You have no heart-rate range. Go by how hard the work feels.',
    guide !== null && `As a guide, ${rangeWords(guide)}.`,
    ceiling !== null && `Stay under ${ceiling.value}.`,
    resting !== null && `At rest: ${resting}.`,
    marker !== null && `${marker.label}: ${marker.value}.`,
  ];
}

/** The load line in words, for who does not see it; the patient's speaks of *stay under*, not of a ceiling. */
export function describeLoadLine(facts: LoadLineFacts, size: LoadLineSize): string {
  const sentences = size === 'patient' ? forPatient(facts) : forStaff(facts);
  return sentences.filter((sentence) => sentence !== false).join(' ');
}
