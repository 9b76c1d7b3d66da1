import { HttpClient } from '@angular/common/http';
import { Injectable, computed, inject, signal } from '@angular/core';
import type { Role, SessionResponse, SignInRequest } from '@shared/contracts/accounts-contract';
import { firstValueFrom } from 'rxjs';
import { type Problem, toProblem } from './problem';

const nobody: SessionResponse = { user: null, demo: false, demoAccounts: [] };

/** Who is signed in, for the whole client. */
@Injectable({ providedIn: 'root' })
export class Session {
  readonly #http = inject(HttpClient);
  readonly #state = signal(nobody);
  readonly #problem = signal<Problem | null>(null);

  readonly user = computed(() => this.#state().user);
  readonly roles = computed<readonly Role[]>(() => this.user()?.roles ?? []);
  readonly demo = computed(() => this.#state().demo);
  readonly demoAccounts = computed(() => this.#state().demoAccounts);
  /** Why the session could not be read, null when it could. */
  readonly problem = this.#problem.asReadonly();

  /** Reads the session; the answer also sets the cookie that later writes send back. */
  async load(): Promise<void> {
    try {
      // zod comes in its own chunk, fetched while the server answers.
      const [answer, { sessionResponseSchema }] = await Promise.all([
        firstValueFrom(this.#http.get<unknown>('/api/auth/session')),
        import('@shared/contracts/accounts-contract'),
      ]);
      this.#state.set(sessionResponseSchema.parse(answer));
      this.#problem.set(null);
    } catch (error) {
      this.#problem.set(toProblem(error));
    }
  }

  /**
   * Signs in and reads the new session.
   * @throws Problem `wrong-credentials`, `too-many-requests` (with `retryAfter`), or another
   */
  async signIn(credentials: SignInRequest): Promise<void> {
    await firstValueFrom(this.#http.post('/api/auth/sign-in', credentials));
    await this.load();
  }

  /** @throws Problem when the server did not end the session */
  async signOut(): Promise<void> {
    await firstValueFrom(this.#http.post('/api/auth/sign-out', null));
    this.forget();
  }

  /** Drops the user here; the server has ended or refused the session already. */
  forget(): void {
    this.#state.update((state) => ({ ...state, user: null }));
  }
}
