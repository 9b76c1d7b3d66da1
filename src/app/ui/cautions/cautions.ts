import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Caution, Severity } from '@shared/clinical/prescribing/answer';
import { Icon } from '../icon/icon';
import type { IconName } from '../icon/icon-names';

const order: readonly Severity[] = ['stop', 'warn', 'note'];
const signs: Readonly<Record<Severity, IconName>> = { stop: 'stop', warn: 'warning', note: 'info' };
const severityWords: Readonly<Record<Severity, string>> = {
  stop: 'Stop',
  warn: 'Caution',
  note: 'Note',
};

/** What a range warns of, what stops first; each with its sign and its word. */
@Component({
  selector: 'app-cautions',
  imports: [Icon],
  template: `
    <ul>
      @for (caution of sorted(); track caution.code) {
        <li [class]="caution.severity">
          <app-icon [name]="signs[caution.severity]" />
          <span
            ><b>{{ words[caution.severity] }}.</b> {{ caution.message }}</span
          >
        </li>
      }
    </ul>
  `,
  styleUrl: './cautions.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Cautions {
  readonly cautions = input.required<readonly Caution[]>();
  protected readonly signs = signs;
  protected readonly words = severityWords;
  protected readonly sorted = computed(() =>
    order.flatMap((severity) => this.cautions().filter((one) => one.severity === severity)),
  );
}
