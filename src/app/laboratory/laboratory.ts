import { ChangeDetectionStrategy, Component, computed, inject, resource } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { type Account, type AccountRole, listAccounts } from '#shared/contracts/accounts';
import { Api } from '../core/api/api';
import { ApiProblem } from '../core/api/api-problem';
import { Messages } from '../core/messages/messages';
import { Dialogs } from '../ui/confirm-dialog/dialogs';
import { Icon } from '../ui/icon/icon';
import { PageTitle } from '../ui/page-title/page-title';
import { ProblemMessage } from '../ui/problem-message/problem-message';
import { roleNames } from './role-names';

/** The accounts of the laboratory and of the attorneys known to it. */
@Component({
  selector: 'app-laboratory',
  imports: [Icon, MatButton, PageTitle, ProblemMessage],
  templateUrl: './laboratory.html',
  styleUrl: './laboratory.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Laboratory {
  private readonly api = inject(Api);
  private readonly dialogs = inject(Dialogs);
  private readonly messages = inject(Messages);

  private readonly reading = resource({
    loader: ({ abortSignal: abort }) => this.api.call(listAccounts, { abort }),
  });
  protected readonly accounts = computed(() => {
    if (!this.reading.hasValue()) return null;
    const order: AccountRole[] = ['laboratory-lead', 'investigator', 'attorney'];
    return [...this.reading.value().items].sort(
      (a, b) => order.indexOf(a.role) - order.indexOf(b.role) || a.name.localeCompare(b.name),
    );
  });
  protected readonly problem = computed(() => {
    const error = this.reading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly roleNames = roleNames;

  protected reload(): void {
    this.reading.reload();
  }

  protected async add(): Promise<void> {
    const added = await this.dialogs.open<Account>(
      async () => (await import('./add-account-dialog')).AddAccountDialog,
      null,
      '480px',
    );
    if (!added) return;
    this.messages.done(`${added.name} can now sign in.`);
    this.reading.update((list) => ({ items: [...(list?.items ?? []), added] }));
  }
}
