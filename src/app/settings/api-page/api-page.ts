import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { SettingsClient } from '../settings-client';
import { filtered, readOpenApi } from './read-openapi';

/** Every call of the server, from the description that it makes of itself. */
@Component({
  selector: 'app-api-page',
  imports: [
    EmptyState,
    MatButton,
    MatFormField,
    MatInput,
    MatLabel,
    PageHeader,
    ProblemMessage,
    Skeleton,
  ],
  templateUrl: './api-page.html',
  styleUrls: ['../settings-page.scss', './api-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ApiPage {
  protected readonly read = inject(SettingsClient).openApi();
  protected readonly problem = computed(() => failureOf(this.read));
  protected readonly reference = computed(() => {
    const document = valueOf(this.read);
    return document === undefined ? undefined : readOpenApi(document);
  });
  protected readonly query = signal('');
  protected readonly areas = computed(() => {
    const reference = this.reference();
    return reference && filtered(reference, this.query());
  });
  /** The fields of a call are put on the page when it is opened first. */
  protected readonly opened = signal<ReadonlySet<string>>(new Set());

  protected open(id: string): void {
    this.opened.update((opened) => (opened.has(id) ? opened : new Set([...opened, id])));
  }
}
