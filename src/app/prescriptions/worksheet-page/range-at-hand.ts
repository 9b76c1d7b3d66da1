import { computed, linkedSignal, signal, type Signal } from '@angular/core';
import { firstValueFrom } from 'rxjs';
import type { Prescription } from '@shared/contracts/prescription-record-contract';
import { failureOf, valueOf } from '../../core/resource-state';
import type { Worksheet } from '@shared/contracts/prescriptions-worksheet-contract';
import type { PrescriptionsClient } from '../prescriptions-client';

/** The range on the worksheet as the server has it, with the record that it rests on and the versions beside it. */
export class RangeAtHand {
  readonly #patientId: Signal<string | undefined>;
  readonly #prescriptionId: Signal<string | undefined>;
  readonly #read;
  readonly #worksheet;
  readonly #history;
  readonly #client: PrescriptionsClient;
  readonly #written = signal<Prescription | null>(null);

  /**
   * Made where things can be injected.
   * @param patientId of a new range
   * @param prescriptionId of a draft or a signed one
   */
  constructor(
    client: PrescriptionsClient,
    patientId: Signal<string | undefined>,
    prescriptionId: Signal<string | undefined>,
  ) {
    this.#client = client;
    this.#patientId = patientId;
    this.#prescriptionId = prescriptionId;
    this.#read = client.prescription(prescriptionId);
    const of = computed(() => this.#patientId() ?? this.stored()?.patientId);
    this.#worksheet = client.worksheet(of);
    this.#history = client.history(of);
  }

  /** As it was read, or as this page wrote it last. */
  readonly stored = computed(() => {
    const [id, written] = [this.#prescriptionId(), this.#written()];
    if (written && (id === undefined || written.id === id)) return written;
    return id === undefined ? null : (valueOf(this.#read) ?? null);
  });
  readonly worksheet = computed(() => valueOf(this.#worksheet));
  /** The range in force as it stands now, also where the fields still rest on an earlier record. */
  readonly inForce = linkedSignal<Worksheet['inForce']>(() => this.worksheet()?.inForce ?? null);
  /** The record changed under what was typed. */
  readonly outdated = linkedSignal(() => this.worksheet() === undefined);
  readonly history = computed(() => valueOf(this.#history) ?? []);
  readonly failure = computed(
    () => failureOf(this.#read) ?? failureOf(this.#worksheet) ?? failureOf(this.#history),
  );
  /** A signed one, or one put aside, stands as it is. */
  readonly fixed = computed(() => {
    const stored = this.stored();
    return stored !== null && (stored.signedAt !== null || stored.status !== 'draft')
      ? stored
      : null;
  });
  readonly ready = computed(
    () => this.worksheet() !== undefined && (!this.#prescriptionId() || this.stored() !== null),
  );
  /** What the fields begin with: the draft's, or the record's. */
  readonly inputs = computed(() =>
    this.#prescriptionId() ? valueOf(this.#read)?.inputs : this.worksheet()?.record.inputs,
  );

  /** Takes over what the server answered to a write. */
  wrote(prescription: Prescription): void {
    this.#written.set(prescription);
  }

  /** Somebody changed the record: read anew, but what was typed here is kept. */
  async recordChanged(typed: boolean): Promise<void> {
    const patientId = this.worksheet()?.patient.id;
    if (patientId === undefined) return;
    if (!typed) return this.reload();
    const { inForce } = await firstValueFrom(this.#client.worksheetNow(patientId));
    this.inForce.set(inForce);
    this.outdated.set(true);
    this.reloadHistory();
  }

  reloadHistory(): void {
    this.#history.reload();
  }

  /** After a signature: what the record says of the range in force changes with it. */
  reload(): void {
    this.#history.reload();
    this.#worksheet.reload();
  }
}
