import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  effect,
  type ElementRef,
  inject,
  input,
  model,
  output,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { Theme } from '../../core/theme/theme';
import { Icon } from '../icon/icon';
import { drawBodies, drawCentres, drawGuides, drawJoints } from './drawing/bodies';
import { drawGrid } from './drawing/grid';
import { drawLabels } from './drawing/labels';
import { drawRings, markLabels } from './drawing/marks';
import type { Sheet } from './drawing/sheet';
import { drawVectors } from './drawing/vectors';
import { coloursAt, type PlanColours } from './plan-colours';
import type {
  PlanBody,
  PlanCentre,
  PlanGuide,
  PlanJoint,
  PlanMark,
  PlanMove,
  PlanPoint,
  PlanTrace,
  PlanVector,
  PlanVectorKind,
} from './plan-content';
import { extentOf } from './plan-extent';
import { PlanFurniture, type VectorKey } from './plan-furniture';
import { PlanMap } from './plan-map';
import { vectorScale, type VectorScale } from './plan-scale';

/** Key codes of the plan: how far each moves the view, in parts of its size. */
const pans: Record<string, readonly [right: number, up: number]> = {
  ArrowLeft: [-0.15, 0],
  ArrowRight: [0.15, 0],
  ArrowUp: [0, 0.15],
  ArrowDown: [0, -0.15],
};

let count = 0;

/**
 * The scale plan: marks with their uncertainty, traces, bodies, vectors and instantaneous centres in
 * the scene's metres. Inputs are described in ./plan-content.
 */
@Component({
  selector: 'ui-scale-plan',
  imports: [Icon, PlanFurniture],
  templateUrl: './scale-plan.html',
  styleUrl: './scale-plan.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ScalePlan {
  private readonly theme = inject(Theme);
  private readonly destroyed = inject(DestroyRef);

  readonly label = input.required<string>();
  readonly marks = input<readonly PlanMark[]>([]);
  readonly traces = input<readonly PlanTrace[]>([]);
  readonly bodies = input<readonly PlanBody[]>([]);
  readonly vectors = input<readonly PlanVector[]>([]);
  readonly centres = input<readonly PlanCentre[]>([]);
  readonly guides = input<readonly PlanGuide[]>([]);
  readonly joints = input<readonly PlanJoint[]>([]);
  readonly selected = model<string | null>(null);
  readonly highlighted = input<readonly string[]>([]);
  readonly xAxisBearing = input<number | null>(null);
  readonly feet = input(false);
  readonly ellipseScale = input(1);
  /** Largest velocity (m/s) and acceleration (m/s²) to come: keeps one scale while a motion plays. */
  readonly largest = input<{ readonly velocity?: number; readonly acceleration?: number }>({});
  readonly movable = input(false);
  readonly moved = output<PlanMove>();
  readonly pointed = output<PlanPoint>();

  protected readonly helpId = `plan-help-${++count}`;
  protected readonly resolution = signal(0.05);
  protected readonly pointer = signal<PlanPoint | null>(null);
  private readonly sheet = viewChild.required<ElementRef<HTMLElement>>('sheet');
  private readonly map = signal<PlanMap | null>(null);
  private readonly colours = signal<PlanColours | null>(null);

  private readonly byId = computed(() => new Map(this.marks().map((mark) => [mark.id, mark])));
  private readonly ringed = computed(() => {
    const ids = new Set([...this.highlighted(), this.selected() ?? '']);
    return [...ids].flatMap((id) => this.byId().get(id) ?? []);
  });
  private readonly scales = computed(() => {
    const { velocity = 0, acceleration = 0 } = this.largest();
    const longest = (kinds: readonly PlanVectorKind[], least: number): number =>
      this.vectors()
        .filter((vector) => kinds.includes(vector.kind))
        .reduce((most, { value }) => Math.max(most, Math.hypot(value[0], value[1])), least);
    // One scale for both, so that relative velocities close the polygon with the others.
    const ofVelocities = vectorScale(longest(['velocity', 'relative'], velocity));
    return {
      velocity: ofVelocities,
      relative: ofVelocities,
      acceleration: vectorScale(longest(['acceleration'], acceleration)),
    } satisfies Record<PlanVectorKind, VectorScale | null>;
  });
  protected readonly vectorKeys = computed<VectorKey[]>(() => {
    const names = {
      velocity: 'velocity',
      relative: 'relative velocity',
      acceleration: 'acceleration',
    } as const;
    return (Object.keys(names) as PlanVectorKind[]).flatMap((kind) => {
      const scale = this.scales()[kind];
      const present = this.vectors().some((vector) => vector.kind === kind);
      return scale && present ? [{ kind, name: names[kind], scale }] : [];
    });
  });
  protected readonly hasEllipses = computed(() =>
    this.marks().some((mark) => mark.covariance !== null),
  );
  protected readonly pointerText = computed(() => {
    const at = this.pointer();
    return at === null ? '' : `x ${length(at[0])} m, y ${length(at[1])} m`;
  });
  protected readonly selectedText = computed(() => {
    const mark = this.byId().get(this.selected() ?? '');
    return mark === undefined
      ? ''
      : `${mark.label}, ${mark.kind}, x ${length(mark.at[0])} m, y ${length(mark.at[1])} m`;
  });
  private readonly extent = computed(() =>
    extentOf({
      marks: this.marks(),
      bodies: this.bodies(),
      guides: this.guides(),
      joints: this.joints(),
      centres: this.centres(),
    }),
  );

  constructor() {
    afterNextRender(() => this.open());
    effect(() => {
      this.theme.isDark();
      if (this.map()) this.readColours();
    });
    effect(() => {
      const [map, colours] = [this.map(), this.colours()];
      if (!map || !colours) return;
      map.marks.show(this.marks(), this.traces(), this.ellipseScale(), colours);
    });
    effect(() => {
      const map = this.map();
      // Read, so that the drawing follows them.
      this.bodies();
      this.scales();
      this.vectors();
      this.centres();
      this.guides();
      this.joints();
      this.ringed();
      this.colours();
      map?.redraw();
    });
    effect(() => {
      const [map, mark] = [this.map(), this.byId().get(this.selected() ?? '')];
      if (mark) map?.reveal(mark.at);
    });
    let fitted = false;
    effect(() => {
      const [map, extent] = [this.map(), this.extent()];
      if (fitted || !map || !extent) return;
      fitted = true;
      untracked(() => map.fit(extent, false));
    });
  }

  /** Shows everything. */
  fit(): void {
    this.map()?.fit(this.extent() ?? [-10, -10, 10, 10], true);
  }

  protected zoom(factor: number): void {
    // What is looked at stays in sight.
    this.map()?.zoom(factor, this.byId().get(this.selected() ?? '')?.at ?? null);
  }

  protected useKey(event: KeyboardEvent): void {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.key in pans) this.map()?.pan(...pans[event.key]);
    else if (event.key === '+' || event.key === '=') this.zoom(1.5);
    else if (event.key === '-' || event.key === '−') this.zoom(1 / 1.5);
    else if (event.key === '0' || event.key === 'Home') this.fit();
    else if (event.key === ']') this.step(1);
    else if (event.key === '[') this.step(-1);
    else if (event.key === 'Escape' && this.selected() !== null) this.selected.set(null);
    else return;
    event.preventDefault();
  }

  /** To the next or the previous mark in their order. */
  private step(by: 1 | -1): void {
    const marks = this.marks();
    if (marks.length === 0) return;
    const at = marks.findIndex((mark) => mark.id === this.selected());
    const next = at < 0 ? (by > 0 ? 0 : -1) : (at + by) % marks.length;
    this.selected.set(marks.at(next)?.id ?? null);
  }

  private open(): void {
    const element = this.sheet().nativeElement;
    const map = new PlanMap(
      element,
      {
        viewChanged: (resolution) => this.resolution.set(resolution),
        hovered: (at) => this.pointer.set(at),
        chose: (mark) => this.selected.set(mark.id),
        pointed: (at) => this.pointed.emit(at),
        mayMove: () => this.movable(),
        moved: (mark, at, settled) => this.moved.emit({ markId: mark.id, at, settled }),
      },
      (sheet) => this.drawUnder(sheet),
      (sheet, inSight) => this.drawOver(sheet, inSight),
    );
    this.map.set(map);
    const print = matchMedia('print');
    const repaint = (): void => {
      this.readColours();
      map.redrawNow();
    };
    print.addEventListener('change', repaint);
    this.destroyed.onDestroy(() => {
      print.removeEventListener('change', repaint);
      map.dispose();
    });
  }

  private readColours(): void {
    this.colours.set(coloursAt(this.sheet().nativeElement));
  }

  private drawUnder(sheet: Sheet): void {
    const colours = this.colours();
    if (colours) drawGrid(sheet, colours);
  }

  private drawOver(sheet: Sheet, inSight: () => PlanMark[]): void {
    const colours = this.colours();
    if (!colours) return;
    const scales = this.scales();
    const guides = drawGuides(sheet, this.guides(), colours);
    const labels = [
      ...drawBodies(sheet, this.bodies(), colours),
      ...drawJoints(sheet, this.joints(), colours),
      ...drawCentres(sheet, this.centres(), colours),
      ...drawVectors(sheet, this.vectors(), (kind) => scales[kind], colours),
      ...guides,
    ];
    drawRings(sheet, this.ringed(), this.selected(), colours);
    drawLabels(sheet, [...labels, ...markLabels(sheet, inSight(), this.selected())], colours);
  }
}

/** Millimetres are as fine as a pointer is. */
const length = (value: number): string => value.toFixed(3).replace('-', '−');
