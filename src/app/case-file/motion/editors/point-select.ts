import { ChangeDetectionStrategy, Component, computed, inject, input, model } from '@angular/core';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatSelectModule } from '@angular/material/select';
import { Draft } from '../draft';

export interface PointRef {
  readonly body: string;
  readonly point: string;
}

/** One named point out of those of every body. */
@Component({
  selector: 'app-point-select',
  imports: [MatFormFieldModule, MatSelectModule],
  template: `
    <mat-form-field appearance="outline" subscriptSizing="dynamic">
      <mat-label>{{ label() }}</mat-label>
      <mat-select [value]="key()" (selectionChange)="take($event.value)">
        @for (body of bodies(); track body.id) {
          <mat-optgroup [label]="body.name">
            @for (point of body.points; track point.id) {
              <mat-option [value]="body.id + '.' + point.id">
                {{ point.name }} ({{ point.id }})
              </mat-option>
            }
          </mat-optgroup>
        }
      </mat-select>
      @if (fault()) {
        <mat-hint class="fault">{{ fault() }}</mat-hint>
      }
    </mat-form-field>
  `,
  styles: `
    :host,
    mat-form-field {
      display: block;
      width: 100%;
    }
    .fault {
      color: var(--fault);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PointSelect {
  private readonly draft = inject(Draft);

  readonly label = input.required<string>();
  readonly value = model.required<PointRef | null>();
  readonly fault = input<string | undefined>();

  protected readonly bodies = computed(() => this.draft.document()?.bodies ?? []);
  protected readonly key = computed(() => {
    const ref = this.value();
    return ref === null ? null : `${ref.body}.${ref.point}`;
  });

  protected take(key: string): void {
    const [body, point] = key.split('.');
    this.value.set({ body, point });
  }
}
