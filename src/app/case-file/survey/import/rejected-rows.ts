import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { RejectedRow } from '#shared/contracts/survey';

/** Rows of a file that were not taken, word for word, each with its reason. */
@Component({
  selector: 'app-rejected-rows',
  template: `
    <table class="plain">
      <thead>
        <tr>
          <th scope="col" class="number">Row</th>
          <th scope="col">Why</th>
          <th scope="col">The row</th>
        </tr>
      </thead>
      <tbody>
        @for (row of rows(); track row.row) {
          <tr>
            <td class="number">{{ row.row }}</td>
            <td>{{ row.field }}: {{ row.message }}</td>
            <td>
              <code>{{ row.raw }}</code>
            </td>
          </tr>
        }
      </tbody>
    </table>
  `,
  styles: `
    table {
      font-size: 14px;
    }
    td {
      padding-block: 3px;
    }
    code {
      overflow-wrap: anywhere;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RejectedRows {
  readonly rows = input.required<readonly RejectedRow[]>();
}
