import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Messages } from '../../../core/messages/messages';
import { Dialogs } from '../../../ui/confirm-dialog/dialogs';
import { showMoment } from '../../../ui/dates/dates';
import { type DraftContent, Draft } from '../draft';
import { Place } from '../place';
import { Workbench } from '../workbench';
import { Faults } from './faults';
import { WordsField } from './words-field';

/** The reconstructions of the case side by side: each says what it assumes. */
@Component({
  selector: 'app-alternatives-editor',
  imports: [MatButton, WordsField],
  template: `
    <p class="note">
      Each alternative is solved by itself, and all are disclosed together. Say in one sentence what
      it assumes.
    </p>
    <ul class="list">
      @for (one of workbench.alternatives(); track one.id) {
        <li>
          <button
            class="row"
            type="button"
            [attr.aria-expanded]="one.id === chosenId()"
            (click)="choose(one.id)"
          >
            {{ one.name }}
            <span class="end">saved {{ moment(one.changedAt) }}, {{ one.changedBy }}</span>
          </button>
          @if (one.id === chosenId()) {
            @if (draft.content(); as content) {
              <div class="form">
                <app-words-field
                  label="Name"
                  [value]="content.name"
                  (valueChange)="draft.change({ name: $event }, 'name')"
                  [fault]="nameFault()"
                />
                <app-words-field
                  label="What it assumes"
                  long
                  [most]="1000"
                  [value]="content.assumption"
                  (valueChange)="draft.change({ assumption: $event }, 'assumption')"
                  hint="The left rear wheel made trace T3"
                />
                @if (workbench.mayWork()) {
                  <div class="actions">
                    <button
                      matButton="outlined"
                      type="button"
                      [disabled]="busy()"
                      (click)="copy(content)"
                    >
                      Copy as a further alternative
                    </button>
                  </div>
                }
              </div>
            }
          }
        </li>
      }
    </ul>
    @if (workbench.mayWork()) {
      <div class="actions">
        <button matButton="outlined" type="button" [disabled]="busy()" (click)="begin({})">
          Begin an empty alternative
        </button>
      </div>
    }
  `,
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AlternativesEditor {
  protected readonly draft = inject(Draft);
  protected readonly workbench = inject(Workbench);
  private readonly place = inject(Place);
  private readonly faults = inject(Faults);
  private readonly messages = inject(Messages);
  private readonly dialogs = inject(Dialogs);

  protected readonly busy = signal(false);
  protected readonly moment = showMoment;
  protected readonly chosenId = computed(() => this.draft.base()?.id ?? null);
  protected readonly nameFault = computed(() =>
    this.draft.content()?.name.trim() === '' ? 'must not be empty' : this.faults.at('name'),
  );

  protected async choose(id: string): Promise<void> {
    if (id !== this.chosenId() && (await this.mayLeave())) {
      this.place.go({ alternative: id, station: null, point: null, item: null });
    }
  }

  protected copy(content: DraftContent): Promise<void> {
    return this.begin({ ...content, name: `${content.name}, copy`.slice(0, 120) });
  }

  protected async begin(content: Partial<DraftContent>): Promise<void> {
    if (content.document === undefined && !(await this.mayLeave())) return;
    this.busy.set(true);
    try {
      await this.workbench.begin(content);
    } catch (error) {
      this.messages.fault(error);
    } finally {
      this.busy.set(false);
    }
  }

  private async mayLeave(): Promise<boolean> {
    return (
      !this.draft.changed() ||
      (await this.dialogs.confirm({
        title: 'Leave this alternative without saving?',
        text: `What you changed in ${this.draft.content()?.name ?? 'it'} is not saved yet.`,
        yes: 'Leave without saving',
        no: 'Stay here',
      }))
    );
  }
}
