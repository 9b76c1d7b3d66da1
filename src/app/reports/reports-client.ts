import { HttpClient, type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable, type Signal, inject } from '@angular/core';
import type { Params } from '@angular/router';
import {
  type CompletionDefinition,
  type CompletionPatient,
  type CompletionReport,
  completionPatientsSchema,
  completionReportSchema,
} from '@shared/contracts/reports-contract';
import { type Site, sitesResponseSchema } from '@shared/contracts/sites-contract';
import { type Observable, map } from 'rxjs';

export interface CompletionPatientsPart {
  readonly total: number;
  readonly items: CompletionPatient[];
  readonly nextCursor: string | null;
}

@Injectable({ providedIn: 'root' })
export class ReportsClient {
  readonly #http = inject(HttpClient);

  completion(params: Signal<Params>): HttpResourceRef<CompletionReport | undefined> {
    return httpResource(() => ({ url: '/api/reports/completion', params: params() }), {
      parse: (answer) => completionReportSchema.parse(answer),
    });
  }

  patients(params: Params): Observable<CompletionPatientsPart> {
    return this.#http
      .get('/api/reports/completion/patients', { params })
      .pipe(map((answer) => completionPatientsSchema.parse(answer)));
  }

  sites(): HttpResourceRef<readonly Site[] | undefined> {
    return httpResource(() => '/api/sites', {
      parse: (answer) => sitesResponseSchema.parse(answer).items,
    });
  }

  define(completionDefinition: CompletionDefinition): Observable<unknown> {
    return this.#http.put('/api/reports/settings', { completionDefinition });
  }
}
