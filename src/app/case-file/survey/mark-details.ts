import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Mark, MarkChange } from '#shared/contracts/survey';
import { MarkSymbol } from '../../ui/scale-plan/mark-symbol';
import { ChangeList } from './change-list';
import { correlationOf, heightOf, placeInTrace, sigmaOf, sourceOf, withSigma } from './show-mark';

/** Everything about the selected mark: where it is, how well that is known, and where it came from. */
@Component({
  selector: 'app-mark-details',
  imports: [ChangeList, MarkSymbol, MatButton],
  template: `
    <div class="heading">
      <h3><ui-mark-symbol [kind]="mark().kind" /> {{ mark().label }}</h3>
      <span class="muted">{{ mark().kind }}</span>
    </div>
    <dl>
      @for (fact of facts(); track fact.name) {
        <div>
          <dt>{{ fact.name }}</dt>
          <dd>{{ fact.text }}</dd>
        </div>
      }
    </dl>
    @if (mark().source.raw) {
      <p class="raw">
        <span class="muted">word for word:&ngsp;</span><code>{{ mark().source.raw }}</code>
      </p>
    }
    @if (mayChange()) {
      <div class="actions screen-only">
        <button matButton="outlined" type="button" (click)="changed.emit()">Change</button>
        <button matButton type="button" (click)="withdrawn.emit()">Withdraw</button>
      </div>
    }
    @if (history().length > 0) {
      <h4>What it was before</h4>
      <app-change-list [changes]="history()" />
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 8px;
      padding: 10px 12px;
      border: 1px solid var(--line);
      border-left: 3px solid var(--spruce);
    }
    .heading {
      display: flex;
      align-items: baseline;
      gap: 10px;
    }
    dl {
      display: grid;
      grid-template-columns: repeat(auto-fill, minmax(180px, 1fr));
      gap: 4px 16px;
      margin: 0;
    }
    dt {
      color: var(--muted);
      font-size: 13px;
    }
    dd {
      margin: 0;
    }
    p,
    h4 {
      margin: 0;
    }
    .raw {
      overflow-wrap: anywhere;
      font-size: 13px;
    }
    .actions {
      display: flex;
      gap: 8px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MarkDetails {
  readonly mark = input.required<Mark>();
  readonly history = input.required<readonly MarkChange[]>();
  readonly mayChange = input.required<boolean>();
  readonly changed = output();
  readonly withdrawn = output();

  protected readonly facts = computed(() => {
    const mark = this.mark();
    const [sx, sy] = sigmaOf(mark);
    const correlation = correlationOf(mark);
    return [
      { name: 'x', text: withSigma(mark.at[0], sx) },
      { name: 'y', text: withSigma(mark.at[1], sy) },
      { name: 'Correlation of x and y', text: correlation === 0 ? '' : correlation.toFixed(2) },
      { name: 'Height', text: mark.height === null ? '' : heightOf(mark) },
      { name: 'Trace and place in it', text: placeInTrace(mark) },
      { name: 'Note', text: mark.note },
      { name: 'Came from', text: sourceOf(mark) },
    ].filter((fact) => fact.text !== '');
  });
}
