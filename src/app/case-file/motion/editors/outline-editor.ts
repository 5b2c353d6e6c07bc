import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { ReconstructionBody } from '#shared/engine/documents/reconstruction';
import { putBody } from '../document-edits';
import { Draft } from '../draft';
import { Preferences } from '../preferences';
import { QuantityField } from './quantity-field';

type Corner = [number, number];

/** The outline that is drawn on the plan: a rectangle by its four sides, or corner by corner. */
@Component({
  selector: 'app-outline-editor',
  imports: [MatButton, QuantityField],
  template: `
    <fieldset>
      <legend>Outline on the plan: {{ outline().length }} corners</legend>
      @if (rectangle(); as sides) {
        <div class="pair">
          @for (side of sideNames; track side) {
            <app-quantity-field
              [label]="side + ' of the origin'"
              dimension="length"
              [unit]="preferences.lengthUnit()"
              sign="not-negative"
              [value]="sides[side]"
              (valueChange)="putRectangle(sides, side, $event)"
            />
          }
        </div>
      }
      @if (byCorner() || (outline().length > 0 && rectangle() === null)) {
        @for (corner of outline(); track $index) {
          <div class="pair">
            <app-quantity-field
              [label]="'Corner ' + ($index + 1) + ', x'"
              dimension="length"
              [unit]="preferences.lengthUnit()"
              [value]="corner[0]"
              (valueChange)="putCorner($index, 0, $event)"
            />
            <app-quantity-field
              [label]="'Corner ' + ($index + 1) + ', y'"
              dimension="length"
              [unit]="preferences.lengthUnit()"
              [value]="corner[1]"
              (valueChange)="putCorner($index, 1, $event)"
            />
          </div>
        }
      }
      <div class="actions">
        @if (outline().length === 0) {
          <button matButton="outlined" type="button" (click)="drawRectangle()">
            Draw a rectangle
          </button>
        } @else {
          <button matButton="outlined" type="button" (click)="addCorner()">Add a corner</button>
          <button matButton type="button" (click)="put([])">Remove the outline</button>
        }
      </div>
    </fieldset>
  `,
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OutlineEditor {
  private readonly draft = inject(Draft);
  protected readonly preferences = inject(Preferences);

  readonly body = input.required<ReconstructionBody>();

  protected readonly sideNames = ['ahead', 'behind', 'left', 'right'] as const;
  protected readonly byCorner = signal(false);
  protected readonly outline = computed(() => this.body().outline);
  protected readonly rectangle = computed(() =>
    this.byCorner() ? null : sidesOf(this.body().outline),
  );

  protected drawRectangle(): void {
    const xs = this.body().points.map((point) => Math.abs(point.at[0]));
    const ys = this.body().points.map((point) => Math.abs(point.at[1]));
    const length = Math.max(0.5, ...xs) * 1.2;
    const width = Math.max(0.3, ...ys) * 1.1;
    const rounded = (value: number) => Number(value.toFixed(2));
    this.put(corners(rounded(length), rounded(length), rounded(width), rounded(width)));
  }

  protected putRectangle(sides: Sides, side: keyof Sides, value: number | null): void {
    const now = { ...sides, [side]: value ?? 0 };
    this.put(corners(now.ahead, now.behind, now.left, now.right));
  }

  protected putCorner(index: number, axis: 0 | 1, value: number | null): void {
    this.put(
      this.outline().map((corner, i) =>
        i === index
          ? axis === 0
            ? [value ?? 0, corner[1]]
            : [corner[0], value ?? 0]
          : [corner[0], corner[1]],
      ),
    );
  }

  protected addCorner(): void {
    this.byCorner.set(true);
    const last = this.outline().at(-1) ?? [0, 0];
    this.put([...this.outline(), [last[0], last[1]]]);
  }

  protected put(outline: Corner[]): void {
    this.draft.edit(putBody({ ...this.body(), outline }), `outline ${this.body().id}`);
  }
}

interface Sides {
  readonly ahead: number;
  readonly behind: number;
  readonly left: number;
  readonly right: number;
}

const corners = (ahead: number, behind: number, left: number, right: number): Corner[] => [
  [ahead, left],
  [ahead, -right],
  [-behind, -right],
  [-behind, left],
];

/** The sides of an outline that is a rectangle along the body's axes around its origin, or null. */
export function sidesOf(outline: readonly (readonly [number, number])[]): Sides | null {
  if (outline.length !== 4) return null;
  const xs = outline.map((corner) => corner[0]);
  const ys = outline.map((corner) => corner[1]);
  const sides = {
    ahead: Math.max(...xs),
    behind: -Math.min(...xs),
    left: Math.max(...ys),
    right: -Math.min(...ys),
  };
  if (Object.values(sides).some((side) => side < 0)) return null;
  const wanted = corners(sides.ahead, sides.behind, sides.left, sides.right);
  return outline.every(([x, y], i) => x === wanted[i][0] && y === wanted[i][1]) ? sides : null;
}
