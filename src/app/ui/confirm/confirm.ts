import { ChangeDetectionStrategy, Component, Injectable, Injector, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MAT_DIALOG_DATA, MatDialog, MatDialogModule } from '@angular/material/dialog';
import { firstValueFrom } from 'rxjs';

export interface Question {
  readonly heading: string;
  /** What will be so afterwards, a sentence a line. */
  readonly lines: readonly string[];
  readonly yes: string;
  readonly no: string;
}

@Component({
  selector: 'app-confirm-dialog',
  imports: [MatButton, MatDialogModule],
  template: `
    <h2 mat-dialog-title>{{ question.heading }}</h2>
    <mat-dialog-content>
      @for (line of question.lines; track $index) {
        <p>{{ line }}</p>
      }
    </mat-dialog-content>
    <mat-dialog-actions align="end">
      <button matButton="outlined" [mat-dialog-close]="false">{{ question.no }}</button>
      <button matButton="filled" [mat-dialog-close]="true" cdkFocusInitial>
        {{ question.yes }}
      </button>
    </mat-dialog-actions>
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
class ConfirmDialog {
  protected readonly question = inject<Question>(MAT_DIALOG_DATA);
}

/** Asks before what cannot be undone. */
@Injectable({ providedIn: 'root' })
export class Confirm {
  readonly #injector = inject(Injector);

  /** @returns whether the answer was yes */
  async ask(question: Question): Promise<boolean> {
    const dialog = this.#injector
      .get(MatDialog)
      .open<ConfirmDialog, Question, boolean>(ConfirmDialog, { data: question, maxWidth: '32rem' });
    return (await firstValueFrom(dialog.afterClosed())) === true;
  }
}
