import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { HoldsWork } from '../../core/unsaved-work';
import { showDay } from '../../ui/dates/dates';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { CurrentCase } from '../current-case';
import { BriefForm } from './brief-form';
import { briefFields } from './brief-fields';
import { Parties } from './parties';
import { People } from './people';
import { Questions } from './questions';
import { StageMove } from './stage-move';

/** Who asked what, what is to be answered, who is concerned, who works on it. */
@Component({
  selector: 'app-brief',
  imports: [BriefForm, EmptyState, Icon, MatButton, Parties, People, Questions, StageMove],
  templateUrl: './brief.html',
  styleUrl: './brief.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Brief implements HoldsWork {
  protected readonly current = inject(CurrentCase);
  private readonly form = viewChild(BriefForm);

  protected readonly editing = signal(false);
  protected readonly facts = computed(() => {
    const file = this.current.file();
    return briefFields
      .filter((field) => field.key !== 'title' && field.key !== 'circumstances')
      .map((field) => ({ label: field.label, text: field.show(file) }));
  });
  protected readonly showDay = showDay;

  hasUnsavedWork(): boolean {
    return this.form()?.isChanged() ?? false;
  }
}
