import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  type ElementRef,
  afterRenderEffect,
  computed,
  inject,
  input,
  signal,
  viewChild,
} from '@angular/core';
import type { CompletionRow } from '@shared/contracts/reports-contract';
import { BarController, BarElement, CategoryScale, Chart, LinearScale } from 'chart.js';
import { ColourScheme } from '../../core/colour-scheme';
import { whiskers } from './whiskers';

Chart.register(BarController, BarElement, CategoryScale, LinearScale);
Chart.defaults.font.family = 'Lato';
Chart.defaults.font.size = 13;

/** The rates as bars with their intervals. The table beside it says the same in words, so readers skip the picture. */
@Component({
  selector: 'app-completion-chart',
  template: `<div class="frame" [style.height.rem]="height()">
    <canvas #canvas aria-hidden="true"></canvas>
  </div>`,
  styleUrl: './completion-chart.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CompletionChart {
  readonly rows = input.required<readonly CompletionRow[]>();
  protected readonly height = computed(() => 4 + this.rows().length * 2.5);
  private readonly canvas = viewChild.required<ElementRef<HTMLCanvasElement>>('canvas');
  readonly #scheme = inject(ColourScheme);
  readonly #dark = matchMedia('(prefers-color-scheme: dark)');
  readonly #systemDark = signal(this.#dark.matches);
  #chart: Chart<'bar'> | undefined;

  constructor() {
    const follow = (): void => this.#systemDark.set(this.#dark.matches);
    this.#dark.addEventListener('change', follow);
    inject(DestroyRef).onDestroy(() => {
      this.#dark.removeEventListener('change', follow);
      this.#chart?.destroy();
    });
    afterRenderEffect(() => {
      this.#scheme.choice();
      this.#systemDark();
      this.#draw(this.rows());
    });
  }

  /** Colours resolve through a probe, since a canvas knows nothing of light-dark(). */
  #colour(name: string): string {
    const probe = document.createElement('span');
    probe.style.color = `var(${name})`;
    this.canvas().nativeElement.after(probe);
    const { color } = getComputedStyle(probe);
    probe.remove();
    return color;
  }

  #draw(rows: readonly CompletionRow[]): void {
    this.#chart?.destroy();
    const [bar, text, line] = ['--lagoon', '--text', '--line'].map((name) => this.#colour(name));
    const ends = rows.map(({ low, high }) =>
      low === null || high === null ? null : { low, high },
    );
    this.#chart = new Chart(this.canvas().nativeElement, {
      type: 'bar',
      data: {
        labels: rows.map(({ label }) => label),
        datasets: [
          {
            data: rows.map(({ rate }) => (rate ?? 0) * 100),
            backgroundColor: bar,
            maxBarThickness: 22,
            borderRadius: 3,
          },
        ],
      },
      options: {
        indexAxis: 'y',
        animation: false,
        maintainAspectRatio: false,
        events: [],
        scales: {
          x: {
            min: 0,
            max: 100,
            grid: { color: line },
            ticks: { color: text, callback: (value) => `${value} %` },
          },
          y: { grid: { display: false }, ticks: { color: text } },
        },
      },
      plugins: [whiskers(ends, text ?? 'currentColor')],
    });
  }
}
