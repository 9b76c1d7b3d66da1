import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  computed,
  inject,
  input,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';

interface Count {
  readonly lower: number;
  readonly upper: number;
}

const seconds = 10;

/** What a counted pulse means, in a sentence. */
function verdict(beats: number, { lower, upper }: Count): string {
  if (beats < lower) return 'Below your range. If you feel well, go a bit faster.';
  if (beats > upper) return 'Above your range. Slow down, then count again.';
  return 'In your range. Keep it up.';
}

/** Ten seconds to count the pulse by, told by words and a number on the screen alone: no sound, no motion. */
@Component({
  selector: 'app-pulse-timer',
  imports: [MatButton],
  templateUrl: './pulse-timer.html',
  styleUrl: './pulse-timer.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PulseTimer {
  /** Beats in ten seconds that are in the range. */
  readonly count = input.required<Count>();

  protected readonly state = signal<'ready' | 'counting' | 'done'>('ready');
  protected readonly left = signal(seconds);
  protected readonly beats = signal<number | null>(null);
  protected readonly verdict = computed(() => {
    const beats = this.beats();
    return beats === null ? null : verdict(beats, this.count());
  });
  #ticking: ReturnType<typeof setInterval> | undefined;

  constructor() {
    inject(DestroyRef).onDestroy(() => {
      clearInterval(this.#ticking);
    });
  }

  protected start(): void {
    const end = Date.now() + seconds * 1000;
    this.left.set(seconds);
    this.beats.set(null);
    this.state.set('counting');
    clearInterval(this.#ticking);
    this.#ticking = setInterval(() => {
      this.left.set(Math.max(0, Math.ceil((end - Date.now()) / 1000)));
      if (Date.now() < end) return;
      clearInterval(this.#ticking);
      this.state.set('done');
    }, 100);
  }

  protected typed({ target }: Event): void {
    const { value } = target as HTMLInputElement;
    const beats = Number(value);
    this.beats.set(/^\d{1,2}$/.test(value.trim()) && beats >= 3 ? beats : null);
  }
}
