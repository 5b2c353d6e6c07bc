import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { PlanVectorKind } from './plan-content';
import { gridStep, metres, scaleBar, type VectorScale } from './plan-scale';

/** What a vector of each kind is, in its key. */
export interface VectorKey {
  readonly kind: PlanVectorKind;
  readonly name: string;
  readonly scale: VectorScale;
}

/** Pixels that a scale bar takes at most. */
const longestBar = 150;

/** What makes a drawing a plan: scale bars, grid, north or axes, and the keys of its vectors. */
@Component({
  selector: 'ui-plan-furniture',
  template: `
    <div class="bars">
      @for (bar of bars(); track $index) {
        <svg class="bar" [attr.width]="bar.pixels + 64" height="24" aria-hidden="true">
          <path [attr.d]="'M1 12v8h' + bar.pixels + 'v-8M' + (1 + bar.pixels / 2) + ' 20v-4'" />
          <text x="1" y="9">0</text>
          <text [attr.x]="bar.pixels + 1" y="9" class="end">{{ bar.text }}</text>
        </svg>
      }
      <span class="grid">grid {{ grid() }}</span>
      @if (ellipseScale() > 0) {
        <span class="grid">
          ellipses 95 %{{
            ellipseScale() === 1 ? ', to scale' : ', drawn ' + ellipseScale() + ' times too large'
          }}
        </span>
      }
    </div>
    @if (keys().length > 0) {
      <div class="keys">
        @for (key of keys(); track key.kind) {
          <span class="key">
            <svg
              [attr.width]="key.scale.samplePixels + 2"
              height="12"
              aria-hidden="true"
              [class]="key.kind"
            >
              @let end = key.scale.samplePixels + 1;
              @if (key.kind === 'acceleration') {
                <path [attr.d]="'M1 4.3H' + (end - 9) + 'M1 7.7H' + (end - 9)" class="thin" />
              } @else {
                <path [attr.d]="'M1 6H' + (end - 9)" />
              }
              <path [attr.d]="'M' + end + ' 6l-10 4v-8Z'" class="head" />
            </svg>
            {{ key.name }} {{ key.scale.sample }} {{ key.kind === 'acceleration' ? 'm/s²' : 'm/s' }}
          </span>
        }
      </div>
    }
    <svg class="north" viewBox="-24 -30 48 60" width="48" height="60" role="img">
      @if (xAxisBearing() === null) {
        <title>Axes of the scene: x to the right, y upwards</title>
        <path d="M-14 14H12M-14 14V-12" />
        <path d="M18 14l-8-3.5v7ZM-14 -18l-3.5 8h7Z" class="head" />
        <text x="8" y="27">x</text>
        <text x="-23" y="-14">y</text>
      } @else {
        <title>North</title>
        <g [attr.transform]="'rotate(' + north() + ')'">
          <path d="M0 16V-12" />
          <path d="M0-20l-5 10h10Z" class="head" />
          <text [attr.transform]="'translate(0 24) rotate(' + -north() + ')'" class="middle">
            N
          </text>
        </g>
      }
    </svg>
  `,
  styleUrl: './plan-furniture.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PlanFurniture {
  /** Metres per pixel. */
  readonly resolution = input.required<number>();
  readonly feet = input.required<boolean>();
  readonly ellipseScale = input.required<number>();
  readonly xAxisBearing = input.required<number | null>();
  readonly keys = input.required<readonly VectorKey[]>();

  protected readonly grid = computed(() => metres(gridStep(this.resolution())));
  protected readonly bars = computed(() =>
    (this.feet() ? (['m', 'ft'] as const) : (['m'] as const)).map((unit) =>
      scaleBar(this.resolution(), unit, longestBar),
    ),
  );
  /**
   * Degrees by which the arrow is turned clockwise from "up". The bearing of +x, which points right,
   * is clockwise from north; so north lies that much counter-clockwise from right.
   */
  protected readonly north = computed(() => 90 - ((this.xAxisBearing() ?? 0) * 180) / Math.PI);
}
