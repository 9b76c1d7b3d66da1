import { HttpClient, type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import { type DeskToday, deskTodaySchema } from '@shared/contracts/desk-contract';
import { type FollowUp, followUpsSchema } from '@shared/contracts/follow-ups-contract';
import {
  type Prescription,
  prescriptionSchema,
} from '@shared/contracts/prescription-record-contract';
import {
  type AwaitingItem,
  type PrescribingTasks,
  awaitingListSchema,
  tasksSchema,
} from '@shared/contracts/prescriptions-waiting-contract';
import type * as z from 'zod';
import { type Observable, map } from 'rxjs';

export type AwaitingList = z.infer<typeof awaitingListSchema>;

@Injectable({ providedIn: 'root' })
export class TodayClient {
  readonly #http = inject(HttpClient);

  /** The front desk's day at the sites of who asks. */
  desk(): HttpResourceRef<DeskToday | undefined> {
    return httpResource(() => '/api/desk/today', {
      parse: (answer) => deskTodaySchema.parse(answer),
    });
  }

  /** Who told of thoughts of self-harm and was not spoken with yet. */
  followUps(): HttpResourceRef<FollowUp[] | undefined> {
    return httpResource(() => '/api/follow-ups', {
      parse: (answer) => followUpsSchema.parse(answer).items,
    });
  }

  awaiting(): HttpResourceRef<AwaitingList | undefined> {
    return httpResource(() => '/api/prescriptions/awaiting-signature', {
      parse: (answer) => awaitingListSchema.parse(answer),
    });
  }

  tasks(): HttpResourceRef<PrescribingTasks | undefined> {
    return httpResource(() => '/api/prescriptions/tasks', {
      parse: (answer) => tasksSchema.parse(answer),
    });
  }

  sign({ id, version }: Pick<AwaitingItem, 'id' | 'version'>): Observable<Prescription> {
    return this.#http
      .post(`/api/prescriptions/${id}/sign`, { version })
      .pipe(map((answer) => prescriptionSchema.parse(answer)));
  }
}
