import { HttpClient } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import type {
  ChangePasswordRequest,
  FirstAdministratorRequest,
  ForgottenPasswordRequest,
  SetPasswordRequest,
} from '@shared/contracts/accounts-contract';
import type { Observable } from 'rxjs';

@Injectable({ providedIn: 'root' })
export class AccountsClient {
  readonly #http = inject(HttpClient);

  /** Sends a link to the address if it has an account; the answer is the same when it has none. */
  askForLink(request: ForgottenPasswordRequest): Observable<unknown> {
    return this.#http.post('/api/auth/forgotten-password', request);
  }

  setPassword(request: SetPasswordRequest): Observable<unknown> {
    return this.#http.post('/api/auth/password', request);
  }

  /** @throws Problem `wrong-password` when the current one is another */
  changePassword(request: ChangePasswordRequest): Observable<unknown> {
    return this.#http.post('/api/auth/change-password', request);
  }

  makeFirstAdministrator(request: FirstAdministratorRequest): Observable<unknown> {
    return this.#http.post('/api/auth/first-administrator', request);
  }
}
