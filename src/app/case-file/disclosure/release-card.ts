import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { type Release, downloadReleaseArchive } from '#shared/contracts/disclosure';
import { address } from '../../core/api/address';
import { Dialogs } from '../../ui/confirm-dialog/dialogs';
import { showMoment } from '../../ui/dates/dates';
import { sizeText } from '../../ui/size/size-text';
import { Icon } from '../../ui/icon/icon';
import { CurrentCase } from '../current-case';
import type { WithdrawRequest } from './withdraw-dialog';

/** One release: to whom, what, its archive, and who opened it. */
@Component({
  selector: 'app-release-card',
  imports: [Icon, MatButton],
  templateUrl: './release-card.html',
  styleUrl: './release-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReleaseCard {
  private readonly dialogs = inject(Dialogs);
  protected readonly current = inject(CurrentCase);

  readonly release = input.required<Release>();
  readonly changed = output<Release>();

  protected readonly archiveAddress = computed(() =>
    address(downloadReleaseArchive, { caseId: this.current.id(), releaseId: this.release().id }),
  );
  protected readonly size = computed(() => sizeText(this.release().archive.size));
  protected readonly showMoment = showMoment;

  protected async withdraw(): Promise<void> {
    const withdrawn = await this.dialogs.open<Release>(
      async () => (await import('./withdraw-dialog')).WithdrawDialog,
      { caseId: this.current.id(), release: this.release() } satisfies WithdrawRequest,
      '480px',
    );
    if (withdrawn) this.changed.emit(withdrawn);
  }
}
