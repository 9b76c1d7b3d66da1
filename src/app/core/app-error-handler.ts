import { type ErrorHandler, Injectable, inject } from '@angular/core';
import { Notices } from './notices';
import { Problem } from './problem';

/** What no page caught: to the console whole, to the person in a sentence. */
@Injectable()
export class AppErrorHandler implements ErrorHandler {
  readonly #notices = inject(Notices);

  handleError(error: unknown): void {
    // The sign-in page, which is opened then, says it.
    if (error instanceof Problem && error.code === 'unauthenticated') return;
    console.error(error);
    const message =
      error instanceof Problem
        ? `${error.title}${error.id === null ? '' : ` Reference ${error.id}`}`
        : 'Something on this page failed. Load the page again; if it stays, tell your administrator.';
    this.#notices.say(message).catch((failure: unknown) => {
      console.error(failure);
    });
  }
}
