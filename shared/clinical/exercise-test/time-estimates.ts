import type { Mets, Minutes, Vo2 } from '../../units';
import { metsOf, restingVo2 } from '../../units';
import type { KnownSex } from '../known-sex';
import type { SexAtBirth } from '../prescribing/request';
import type { TestProtocol } from './protocols';
import * as time from './treadmill-time';

export interface TimedTest {
  readonly protocol: TestProtocol;
  readonly sexAtBirth: SexAtBirth;
  /** Time of exercise, decimal minutes. */
  readonly time: Minutes;
  readonly handrail: boolean;
}

/** An uptake from time with the people it was found in; null with the reason where it does not hold. */
export interface TimeEstimate {
  readonly label: string;
  readonly source: string;
  readonly vo2: Vo2 | null;
  readonly mets: Mets | null;
  readonly why: string | null;
}

interface Equation {
  readonly label: string;
  readonly source: string;
  readonly protocol: TestProtocol;
  readonly sexAtBirth: KnownSex | 'either';
  readonly vo2: (test: TimedTest) => Vo2;
}

/** In the order of preference within a protocol. */
const equations: readonly Equation[] = [
  {
    label: 'Men, Bruce',
    source: 'Foster 1984',
    protocol: 'bruce',
    sexAtBirth: 'male',
    vo2: (test) => time.fosterVo2(test.time),
  },
  {
    label: 'Women, Bruce',
    source: 'Pollock 1982',
    protocol: 'bruce',
    sexAtBirth: 'female',
    vo2: (test) => time.pollockWomenVo2(test.time),
  },
  {
    label: 'Men with heart disease, Bruce',
    source: 'Bruce 1973, from memory',
    protocol: 'bruce',
    sexAtBirth: 'male',
    vo2: (test) => time.bruceCardiacMenVo2(test.time),
  },
  {
    label: 'Men, Bruce',
    source: 'Pollock 1976',
    protocol: 'bruce',
    sexAtBirth: 'male',
    vo2: (test) => time.pollockMenVo2(test.time),
  },
  {
    label: 'Sedentary men, Bruce',
    source: 'Bruce 1973',
    protocol: 'bruce',
    sexAtBirth: 'male',
    vo2: (test) => time.bruceSedentaryMenVo2(test.time),
  },
  {
    label: 'Men, by the form for either sex, Bruce',
    source: 'Bruce 1973, from memory',
    protocol: 'bruce',
    sexAtBirth: 'male',
    vo2: (test) => time.bruceGeneralizedVo2(test.time, 'male'),
  },
  {
    label: 'Women, by the form for either sex, Bruce',
    source: 'Bruce 1973, from memory',
    protocol: 'bruce',
    sexAtBirth: 'female',
    vo2: (test) => time.bruceGeneralizedVo2(test.time, 'female'),
  },
  {
    label: 'Bruce',
    source: 'Froelicher',
    protocol: 'bruce',
    sexAtBirth: 'either',
    vo2: (test) => time.froelicherVo2(test.time),
  },
  {
    label: 'Men, Balke',
    source: 'Pollock',
    protocol: 'balke-ware',
    sexAtBirth: 'male',
    vo2: (test) => time.pollockBalkeVo2(test.time),
  },
];

/** No estimate before the first Bruce stage is over, nor past the seventh, where the cubic has no data. Ours. */
const believed = { shortest: 3, longest: 21 } as const;

function whyNot({ time: minutes, handrail }: TimedTest, estimate: Vo2): string | null {
  if (minutes < believed.shortest) return `Not before ${believed.shortest} minutes of exercise.`;
  if (minutes > believed.longest) return `Not after ${believed.longest} minutes of exercise.`;
  if (handrail) return 'Not when the handrail was held: time then overstates the uptake.';
  return estimate <= restingVo2 ? 'The result would lie below rest.' : null;
}

/** Every published estimate for the protocol and sex, the first being the usual one; [] where none was published. */
export function treadmillTimeEstimates(test: TimedTest): TimeEstimate[] {
  return equations
    .filter(
      ({ protocol, sexAtBirth }) =>
        protocol === test.protocol && (sexAtBirth === 'either' || sexAtBirth === test.sexAtBirth),
    )
    .map(({ label, source, vo2 }) => {
      const estimate = vo2(test);
      const why = whyNot(test, estimate);
      return {
        label,
        source,
        vo2: why === null ? estimate : null,
        mets: why === null ? metsOf(estimate) : null,
        why,
      };
    });
}
