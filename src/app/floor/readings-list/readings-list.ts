import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Icon } from '../../ui/icon/icon';
import { EntryQueue } from '../entry-queue/entry-queue';
import { clockText } from '../floor-time';
import { phaseWords, symptomsText } from '../visit/floor-words';
import { type Visit, type VisitReading, currentReadings } from '../visit/visit';

const placeWords = {
  below: 'below range',
  in: 'in range',
  above: 'above range',
  'over-ceiling': 'over ceiling',
} as const;

/** What was read, in words: "104 in range · 138/76 · RPE 13 · 97 %". */
export function valuesText(reading: VisitReading): string {
  const { heartRate, placement, systolic, diastolic, perceivedExertion, oxygenSaturation } =
    reading;
  const asked = reading.symptoms.includes('none') ? 'no symptoms' : symptomsText(reading.symptoms);
  return [
    heartRate === null ? '' : `${heartRate} bpm${placement ? ` ${placeWords[placement]}` : ''}`,
    systolic === null ? '' : `${systolic}/${diastolic ?? '–'}`,
    perceivedExertion === null ? '' : `RPE ${perceivedExertion}`,
    oxygenSaturation === null ? '' : `${oxygenSaturation} %`,
    asked,
    reading.note ?? '',
  ]
    .filter((text) => text !== '')
    .join(' · ');
}

/** The readings of a visit, the last first, each with whether the server has it; corrected ones stay, struck through. */
@Component({
  selector: 'app-readings-list',
  imports: [Icon, MatButton],
  templateUrl: './readings-list.html',
  styleUrl: './readings-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReadingsList {
  protected readonly queue = inject(EntryQueue);
  readonly visit = input.required<Visit>();
  readonly timeZone = input.required<string>();
  readonly canCorrect = input(false);
  readonly correcting = output<VisitReading>();

  protected readonly rows = computed(() => {
    const { readings } = this.visit();
    const current = new Set(currentReadings(readings).map(({ id }) => id));
    return [...readings].reverse().map((reading) => ({
      reading,
      time: clockText(reading.measuredAt, this.timeZone()),
      phase: phaseWords[reading.phase],
      values: valuesText(reading),
      struck: !current.has(reading.id) && reading.entry?.state !== 'refused',
      correctable: current.has(reading.id) && reading.entry === null,
      saved: reading.savedAt && clockText(reading.savedAt, this.timeZone()),
    }));
  });
}
