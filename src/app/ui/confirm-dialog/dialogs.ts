import { Injectable, Injector, type Type, inject } from '@angular/core';
import { firstValueFrom } from 'rxjs';
import type { Question } from './confirm-dialog';

/** Dialogs; their code, and Material's, is fetched when the first one is opened. */
@Injectable({ providedIn: 'root' })
export class Dialogs {
  private readonly injector = inject(Injector);

  /** What the dialog closed with; undefined when it was dismissed. */
  async open<Result>(
    load: () => Promise<Type<unknown>>,
    data: unknown,
    width = '560px',
  ): Promise<Result | undefined> {
    const [{ MatDialog }, dialog] = await Promise.all([import('@angular/material/dialog'), load()]);
    const opened = this.injector.get(MatDialog).open<unknown, unknown, Result>(dialog, {
      data,
      width,
      maxWidth: '94vw',
      autoFocus: 'first-tabbable',
    });
    return firstValueFrom(opened.afterClosed());
  }

  /** True when the person said yes. */
  async confirm(question: Question): Promise<boolean> {
    const load = async () => (await import('./confirm-dialog')).ConfirmDialog;
    return (await this.open<boolean>(load, question, '440px')) ?? false;
  }
}
