import { HttpClient, HttpParams } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import { firstValueFrom } from 'rxjs';

@Injectable({ providedIn: 'root' })
export class MessagesClient {
  readonly #http = inject(HttpClient);

  /** Stops reminders as a mail program does: RFC 8058 section 3.2. @throws Problem `link-expired`, or another */
  async stopReminders(token: string): Promise<void> {
    const body = new HttpParams().set('List-Unsubscribe', 'One-Click');
    await firstValueFrom(
      this.#http.post<unknown>(`/api/unsubscribe/${encodeURIComponent(token)}`, body),
    );
  }
}
