/** "2.8 mph, level" or "3.0 mph, 2.5 %" */
export const treadmillText = (speedMph: number, gradePercent: number): string =>
  `${speedMph.toFixed(1)} mph, ${gradePercent === 0 ? 'level' : `${gradePercent} %`}`;

export const powerText = (powerWatts: number): string => `${powerWatts} W`;

/** The equation counts whole cycles, up and down with both feet, not single steps. */
export const stepText = (stepHeightMeters: number, stepsPerMinute: number): string =>
  `${Math.round(stepHeightMeters * 100)} cm, ${stepsPerMinute} step cycles/min`;
