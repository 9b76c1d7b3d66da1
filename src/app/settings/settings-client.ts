import { HttpClient, type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable, type Signal, inject } from '@angular/core';
import {
  type NewUser,
  type User,
  type UserChange,
  type UsersResponse,
  userSchema,
  usersResponseSchema,
} from '@shared/contracts/accounts-contract';
import {
  type AuditQuery,
  type AuditResponse,
  auditResponseSchema,
} from '@shared/contracts/audit-contract';
import { patientSearchResponseSchema } from '@shared/contracts/patients-contract';
import {
  type PolicyPreview,
  type PolicyPreviewRequest,
  type PolicyPublishRequest,
  type PolicyVersions,
  policyPreviewSchema,
  policyVersionsSchema,
} from '@shared/contracts/policy-change-contract';
import {
  type PolicyInForce,
  policyInForceSchema,
} from '@shared/contracts/policy-in-force-contract';
import {
  type ChangedSite,
  type NewSite,
  type Site,
  type SiteChange,
  type SiteDetails,
  changedSiteSchema,
  siteSchema,
  sitesDetailsResponseSchema,
  sitesResponseSchema,
} from '@shared/contracts/sites-contract';
import { type Observable, map } from 'rxjs';

export type AuditFilter = Omit<AuditQuery, 'cursor' | 'limit'>;

@Injectable({ providedIn: 'root' })
export class SettingsClient {
  readonly #http = inject(HttpClient);

  users(who: 'staff' | 'patients', cursor: string | null): Observable<UsersResponse> {
    const params = { who, limit: 100, ...(cursor !== null && { cursor }) };
    return this.#http
      .get('/api/users', { params })
      .pipe(map((answer) => usersResponseSchema.parse(answer)));
  }

  user(id: Signal<string>): HttpResourceRef<User | undefined> {
    return httpResource(() => `/api/users/${id()}`, {
      parse: (answer) => userSchema.parse(answer),
    });
  }

  invite(person: NewUser): Observable<User> {
    return this.#http.post('/api/users', person).pipe(map((answer) => userSchema.parse(answer)));
  }

  change(id: string, change: UserChange): Observable<User> {
    return this.#http
      .patch(`/api/users/${id}`, change)
      .pipe(map((answer) => userSchema.parse(answer)));
  }

  inviteAgain(id: string): Observable<unknown> {
    return this.#http.post(`/api/users/${id}/invitation`, null);
  }

  endSessions(id: string): Observable<unknown> {
    return this.#http.delete(`/api/users/${id}/sessions`);
  }

  sites(): HttpResourceRef<readonly Site[] | undefined> {
    return httpResource(() => '/api/sites', {
      parse: (answer) => sitesResponseSchema.parse(answer).items,
    });
  }

  siteDetails(): HttpResourceRef<readonly SiteDetails[] | undefined> {
    return httpResource(() => '/api/settings/sites', {
      parse: (answer) => sitesDetailsResponseSchema.parse(answer).items,
    });
  }

  addSite(site: NewSite): Observable<Site> {
    return this.#http.post('/api/sites', site).pipe(map((answer) => siteSchema.parse(answer)));
  }

  changeSite(id: string, change: SiteChange): Observable<ChangedSite> {
    return this.#http
      .put(`/api/sites/${id}`, change)
      .pipe(map((answer) => changedSiteSchema.parse(answer)));
  }

  policy(): HttpResourceRef<PolicyInForce | undefined> {
    return httpResource(() => '/api/policy', {
      parse: (answer) => policyInForceSchema.parse(answer),
    });
  }

  policyVersions(): HttpResourceRef<PolicyVersions | undefined> {
    return httpResource(() => '/api/policy/versions', {
      parse: (answer) => policyVersionsSchema.parse(answer),
    });
  }

  previewPolicy(request: PolicyPreviewRequest): Observable<PolicyPreview> {
    return this.#http
      .post('/api/policy/preview', request)
      .pipe(map((answer) => policyPreviewSchema.parse(answer)));
  }

  publishPolicy(request: PolicyPublishRequest): Observable<PolicyInForce> {
    return this.#http
      .post('/api/policy/versions', request)
      .pipe(map((answer) => policyInForceSchema.parse(answer)));
  }

  audit(filter: AuditFilter, cursor: string | null): Observable<AuditResponse> {
    const params = { ...filter, ...(cursor !== null && { cursor }) };
    return this.#http
      .get('/api/audit', { params })
      .pipe(map((answer) => auditResponseSchema.parse(answer)));
  }

  /** The id of the patient with this record number among those of one's sites, undefined when there is none. */
  patientByNumber(recordNumber: string): Observable<string | undefined> {
    return this.#http.post('/api/patients/search', { q: recordNumber, limit: 10 }).pipe(
      map((answer) => patientSearchResponseSchema.parse(answer).items),
      map((found) => found.find((one) => one.recordNumber === recordNumber)?.id),
    );
  }

  /** The description of the interface, as the server tells it. */
  openApi(): HttpResourceRef<unknown> {
    return httpResource(() => '/api/openapi.json');
  }
}
