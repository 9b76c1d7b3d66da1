import { Injectable, Injector, inject } from '@angular/core';
import type { MatSnackBar } from '@angular/material/snack-bar';

/** Short messages at the foot of the page, read out politely; the code behind them comes at first use. */
@Injectable({ providedIn: 'root' })
export class Notices {
  readonly #injector = inject(Injector);

  async say(message: string): Promise<void> {
    (await this.#snackBar()).open(message, 'Close', { duration: 8000 });
  }

  /** Tells what was done and offers to undo it for ten seconds. */
  async offerUndo(message: string, undo: () => void): Promise<void> {
    const notice = (await this.#snackBar()).open(message, 'Undo', { duration: 10_000 });
    notice.onAction().subscribe(undo);
  }

  async #snackBar(): Promise<MatSnackBar> {
    const { MatSnackBar } = await import('@angular/material/snack-bar');
    return this.#injector.get(MatSnackBar);
  }
}
