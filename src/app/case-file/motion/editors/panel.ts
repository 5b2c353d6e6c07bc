import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatIconButton } from '@angular/material/button';
import { Icon } from '../../../ui/icon/icon';
import { type PanelName, Place } from '../place';
import { RecordsPanel } from '../recorded/records-panel';
import { AlternativesEditor } from './alternatives-editor';
import { BodiesEditor } from './bodies-editor';
import { JointsEditor } from './joints-editor';
import { KnownsEditor } from './knowns-editor';
import { MarksEditor } from './marks-editor';
import { StationsEditor } from './stations-editor';

const titles: Readonly<Record<PanelName, string>> = {
  alternatives: 'Alternatives',
  bodies: 'Bodies and their points',
  joints: 'Joints',
  stations: 'Stations',
  marks: 'Marks at the station',
  knowns: 'Knowns at the station',
  records: 'Recorded computations',
};

/** The sheet beside the plan in which one part of the reconstruction is edited. */
@Component({
  selector: 'app-panel',
  imports: [
    AlternativesEditor,
    BodiesEditor,
    Icon,
    JointsEditor,
    KnownsEditor,
    MarksEditor,
    MatIconButton,
    RecordsPanel,
    StationsEditor,
  ],
  template: `
    <header>
      <h2 id="panel-title">{{ title() }}</h2>
      <button matIconButton type="button" [attr.aria-label]="'Close ' + title()" (click)="close()">
        <ui-icon name="close" />
      </button>
    </header>
    <div class="body">
      @switch (name()) {
        @case ('alternatives') {
          <app-alternatives-editor />
        }
        @case ('bodies') {
          <app-bodies-editor />
        }
        @case ('joints') {
          <app-joints-editor />
        }
        @case ('stations') {
          <app-stations-editor />
        }
        @case ('marks') {
          <app-marks-editor />
        }
        @case ('knowns') {
          <app-knowns-editor />
        }
        @case ('records') {
          <app-records-panel />
        }
      }
    </div>
  `,
  styles: `
    :host {
      display: flex;
      flex-direction: column;
      min-height: 0;
    }
    header {
      display: flex;
      align-items: center;
      justify-content: space-between;
      padding: 4px 4px 4px 14px;
      border-bottom: 1px solid var(--line);
    }
    .body {
      flex: 1;
      min-height: 0;
      overflow-y: auto;
      padding: 10px 14px 20px;
      scrollbar-width: thin;
    }
  `,
  host: {
    role: 'region',
    'aria-labelledby': 'panel-title',
    '(keydown.escape)': 'close()',
  },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Panel {
  private readonly place = inject(Place);

  readonly name = input.required<PanelName>();

  protected readonly title = computed(() => titles[this.name()]);

  protected close(): void {
    this.place.go({ panel: null, item: null });
  }
}
