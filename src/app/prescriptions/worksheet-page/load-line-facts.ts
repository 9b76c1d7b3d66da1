import type { Candidate, PrescriptionAnswer } from '@shared/clinical/prescribing/answer';
import type { MaximumMethod } from '@shared/clinical/prescribing/request';
import type { LoadLineFacts } from '../../ui/load-line/load-line-facts';
import { ceilingReason, percentText } from '../../ui/words/prescription-words';

const maximumNames: Readonly<Record<Exclude<MaximumMethod, 'measured'>, string>> = {
  fox: '220 − age',
  tanaka: 'Tanaka',
  gellish: 'Gellish',
  nes: 'Nes',
  gulati: 'Gulati',
  brawner: 'Brawner',
  keteyian: 'Keteyian',
};

function tickLabel({ method, maximum }: Candidate, { intensity }: PrescriptionAnswer): string {
  switch (method) {
    case 'heart-rate-reserve':
      return maximum === null || maximum === 'measured'
        ? percentText(intensity.upper)
        : maximumNames[maximum];
    case 'percent-of-peak':
      return '% of peak';
    case 'observed-work':
      return 'observed';
    case 'resting-plus':
      return 'rest +';
    case 'perceived-exertion':
      return 'effort';
  }
}

/** Where each other applicable way, and the one taken without its ceiling, would have put the upper end. */
function ticksOf(answer: PrescriptionAnswer): LoadLineFacts['ticks'] {
  return answer.candidates.flatMap((candidate) => {
    const { upper, applicable } = candidate;
    if (!applicable || upper === null || upper === answer.target?.upper) return [];
    return [{ value: upper, label: tickLabel(candidate, answer) }];
  });
}

/** What the worksheet's load line draws. */
export function loadLineFacts(
  answer: PrescriptionAnswer,
  restingSeated: number,
  lastPeak: number | null,
): LoadLineFacts {
  const { target, guide, ceiling, askLine } = answer;
  return {
    resting: restingSeated,
    target,
    guide,
    ceiling: ceiling && { value: ceiling.value, reason: ceilingReason(answer) },
    askLine,
    ticks: ticksOf(answer),
    marker: lastPeak === null ? null : { value: lastPeak, label: 'Last peak' },
  };
}
