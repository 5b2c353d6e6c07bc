import { Injectable, Injector, inject } from '@angular/core';
import { firstValueFrom } from 'rxjs';
import type { Question } from './confirm-dialog';

/** Questions asked in a dialog; its code is fetched when the first one is asked. */
@Injectable({ providedIn: 'root' })
export class Dialogs {
  private readonly injector = inject(Injector);

  /** True when the person said yes. */
  async confirm(question: Question): Promise<boolean> {
    const [{ MatDialog }, { ConfirmDialog }] = await Promise.all([
      import('@angular/material/dialog'),
      import('./confirm-dialog'),
    ]);
    const dialog = this.injector.get(MatDialog).open<unknown, Question, boolean>(ConfirmDialog, {
      data: question,
      width: '440px',
      role: 'alertdialog',
    });
    return (await firstValueFrom(dialog.afterClosed())) ?? false;
  }
}
