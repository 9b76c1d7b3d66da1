import {
  type EquationModality,
  type MetabolicEquation,
  metabolicEquations,
} from '@shared/clinical/gait';
import type { Equipment, PrescriptionPolicy } from '@shared/clinical/prescribing/policy';

const settingWords = { speed: '', power: '', rate: 'step cycles ', height: 'height ' } as const;

function rangeWords({ setting, unit, lowest, highest }: MetabolicEquation['ranges'][number]) {
  const shown = unit === '/min' ? ' a minute' : ` ${unit}`;
  const ends = highest === null ? `from ${lowest}` : `${lowest}–${highest}`;
  return `${settingWords[setting]}${ends}${shown}`;
}

/** The machine’s equation, and between which settings it was validated. */
export function validatedText(modality: EquationModality): string {
  const equation = metabolicEquations.find((one) => one.modality === modality);
  if (!equation) return '';
  const { formula, ranges, note } = equation;
  return `Equation ${formula}, validated: ${ranges.map(rangeWords).join(', ')}.${note ? ` ${note}` : ''}`;
}

const centimeters = (meters: number): number => Math.round(meters * 100);

/** In which steps the program's machines are set, and by which version of the policy. */
export function stepsText({
  equipment,
  version,
}: Pick<PrescriptionPolicy, 'version'> & { readonly equipment: Equipment }): string {
  const { treadmill, cycle, arm, step } = equipment;
  return [
    `Rounded down to steps of ${treadmill.speedMph} mph and ${treadmill.gradePercent} % on the treadmill`,
    `${cycle.power} W on the cycle, ${arm.power} W on the arm ergometer`,
    `step heights ${centimeters(step.lowest)}–${centimeters(step.highest)} cm by ${centimeters(step.by)} (policy ${version}).`,
  ].join('; ');
}
