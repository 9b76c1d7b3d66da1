import { ChangeDetectionStrategy, Component, computed, input, linkedSignal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatCheckbox } from '@angular/material/checkbox';
import { RouterLink } from '@angular/router';
import type { Prescription } from '@shared/contracts/prescription-record-contract';
import { StateChip, type Tone } from '../../ui/state-chip/state-chip';
import { formatDay, formatTime } from '../../ui/words/dates';
import { leadText } from '../../ui/words/prescription-words';

interface Standing {
  readonly words: string;
  readonly tone: Tone;
}

export function standingOf({
  status,
  awaiting,
}: Pick<Prescription, 'status' | 'awaiting'>): Standing {
  switch (status) {
    case 'active':
      return { words: 'In force', tone: 'in' };
    case 'draft':
      return awaiting === null
        ? { words: 'Draft', tone: 'plain' }
        : { words: 'Awaits a physician', tone: 'due' };
    case 'completed':
      return { words: 'Superseded', tone: 'plain' };
    case 'revoked':
      return { words: 'Put aside', tone: 'plain' };
    case 'entered-in-error':
      return { words: 'Entered in error', tone: 'plain' };
  }
}

/** Every version of a patient's range: when, by whom, by which policy, signed by whom. */
@Component({
  selector: 'app-history-list',
  imports: [MatButton, MatCheckbox, RouterLink, StateChip],
  template: `
    <div class="scroll-x" tabindex="0" role="region" aria-label="Table of versions">
      <table class="data">
        <thead>
          <tr>
            <th scope="col">Written</th>
            <th scope="col">Range</th>
            <th scope="col">State</th>
            <th scope="col">Signed</th>
            <th scope="col">Policy</th>
            @if (comparable()) {
              <th scope="col">Compare</th>
            }
          </tr>
        </thead>
        <tbody>
          @for (item of items(); track item.id) {
            <tr [attr.aria-current]="item.current ? 'true' : null">
              <th scope="row">
                @if (item.current) {
                  {{ item.written }} (this one)
                } @else {
                  <a [routerLink]="['/prescriptions', item.id]">{{ item.written }}</a>
                }
                <span class="by">{{ item.by }}</span>
              </th>
              <td>{{ item.lead }}, {{ item.ceiling }}</td>
              <td>
                <app-state-chip [tone]="item.standing.tone">{{
                  item.standing.words
                }}</app-state-chip>
              </td>
              <td>
                @for (signature of item.signatures; track signature) {
                  <span class="signature">{{ signature }}</span>
                } @empty {
                  Not yet
                }
              </td>
              <td>{{ item.policyVersion }}</td>
              @if (comparable()) {
                <td>
                  <mat-checkbox
                    [checked]="chosen().includes(item.id)"
                    [disabled]="chosen().length === 2 && !chosen().includes(item.id)"
                    disabledInteractive
                    [aria-label]="'Compare the version of ' + item.written"
                    (change)="choose(item.id, $event.checked)"
                  />
                </td>
              }
            </tr>
          }
        </tbody>
      </table>
    </div>
    @if (comparable()) {
      <p class="compare">
        @if (chosen().length === 2) {
          <a matButton="outlined" [routerLink]="['/prescriptions/compare', ...chosen()]"
            >Compare the two chosen</a
          >
        } @else {
          <span class="muted">Choose two versions to see them beside each other.</span>
        }
        @if (againstInForce(); as two) {
          <a matButton="outlined" [routerLink]="['/prescriptions/compare', ...two]"
            >Compare this one with the one in force</a
          >
        }
      </p>
    }
  `,
  styleUrl: './history-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class HistoryList {
  readonly prescriptions = input.required<readonly Prescription[]>();
  readonly timeZone = input.required<string>();
  /** The one that the page shows. */
  readonly currentId = input<string | null>(null);

  protected readonly comparable = computed(() => this.prescriptions().length > 1);
  /** Chosen to be compared; begins anew when the list does. */
  protected readonly chosen = linkedSignal<readonly string[]>(() => {
    this.prescriptions();
    return [];
  });
  protected readonly againstInForce = computed(() => {
    const current = this.currentId();
    const inForce = this.prescriptions().find(({ status }) => status === 'active')?.id;
    return current && inForce && current !== inForce ? [inForce, current] : null;
  });

  protected readonly items = computed(() => {
    const zone = this.timeZone();
    const when = (at: string) => `${formatDay(at, zone)}, ${formatTime(at, zone)}`;
    return this.prescriptions().map((one) => ({
      id: one.id,
      current: one.id === this.currentId(),
      written: when(one.createdAt),
      by: one.createdBy.displayName,
      lead: leadText(one.result),
      ceiling: one.result.ceiling ? `ceiling ${one.result.ceiling.value}` : 'no ceiling known',
      standing: standingOf(one),
      signatures: signaturesOf(one, when),
      policyVersion: one.policyVersion,
    }));
  });

  protected choose(id: string, isChosen: boolean): void {
    this.chosen.update((ids) => (isChosen ? [...ids, id] : ids.filter((one) => one !== id)));
  }
}

/** Who signed and when; a physician alone signs for both. */
export function signaturesOf(
  { signedBy, signedAt, physicianSignedBy, physicianSignedAt }: Prescription,
  when: (at: string) => string,
): string[] {
  const staff = signedBy && signedAt ? `${signedBy.displayName}, ${when(signedAt)}` : null;
  const physician =
    physicianSignedBy && physicianSignedAt
      ? `${physicianSignedBy.displayName} (physician), ${when(physicianSignedAt)}`
      : null;
  const both = physicianSignedBy?.id === signedBy?.id ? [physician] : [staff, physician];
  return (physician === null ? [staff] : both).filter((one) => one !== null);
}
