import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatCheckbox } from '@angular/material/checkbox';
import { type PlanMove, type PlanPoint, tracesOf } from '../../ui/scale-plan/plan-content';
import { ScalePlan } from '../../ui/scale-plan/scale-plan';
import { CurrentCase } from '../current-case';
import { Draft } from './draft';
import { LiveAnswer } from './live-answer';
import { Place } from './place';
import {
  nearestPoint,
  planBodies,
  planCentres,
  planGuides,
  planJoints,
  planVectors,
} from './plan-scene';
import { Preferences } from './preferences';
import { WhatIf } from './what-if';
import { Workbench } from './workbench';

/** How near a click must be to a named point of a body to mean it, m. */
const reach = 0.4;

/** The plan of the scene with the bodies at the station, their ghosts, vectors and centres. */
@Component({
  selector: 'app-plan-table',
  imports: [MatCheckbox, ScalePlan],
  template: `
    @defer (on immediate) {
      <ui-scale-plan
        [label]="label()"
        [marks]="marks()"
        [traces]="traces()"
        [bodies]="bodies()"
        [vectors]="vectors()"
        [centres]="centres()"
        [guides]="guides()"
        [joints]="joints()"
        [selected]="place.mark()"
        (selectedChange)="place.go({ mark: $event })"
        [highlighted]="assigned()"
        [xAxisBearing]="current.file().xAxisBearing"
        [feet]="preferences.feet()"
        [movable]="place.panel() === 'marks'"
        (moved)="move($event)"
        (pointed)="point($event)"
      />
    } @placeholder {
      <p class="muted" role="status">Drawing the plan …</p>
    }
    <div class="shows screen-only">
      <mat-checkbox [checked]="showsVelocity()" (change)="showsVelocity.set($event.checked)">
        Velocities
      </mat-checkbox>
      <mat-checkbox
        [checked]="showsAcceleration()"
        (change)="showsAcceleration.set($event.checked)"
      >
        Accelerations
      </mat-checkbox>
      <mat-checkbox [checked]="showsAll()" (change)="showsAll.set($event.checked)">
        All marks
      </mat-checkbox>
    </div>
  `,
  styles: `
    :host {
      display: flex;
      flex-direction: column;
      min-height: 0;
    }
    ui-scale-plan {
      flex: 1;
      min-height: 0;
    }
    p {
      flex: 1;
      margin: 0;
      padding: 12px;
    }
    .shows {
      display: flex;
      flex-wrap: wrap;
      justify-content: flex-end;
      padding: 0 8px;
      border-top: 1px solid var(--line);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PlanTable {
  protected readonly current = inject(CurrentCase);
  protected readonly live = inject(LiveAnswer);
  protected readonly place = inject(Place);
  protected readonly preferences = inject(Preferences);
  private readonly draft = inject(Draft);
  private readonly whatIf = inject(WhatIf);
  private readonly workbench = inject(Workbench);

  protected readonly showsVelocity = signal(true);
  protected readonly showsAcceleration = signal(false);

  protected readonly showsAll = signal(false);

  /** The marks that this reconstruction speaks of; or all, also while it speaks of none. */
  protected readonly marks = computed(() => {
    const all = this.live.marks();
    const used = new Set(
      this.workbench.stations().flatMap((station) => station.marks.map((one) => one.markId)),
    );
    if (this.showsAll() || this.place.panel() === 'marks' || used.size === 0) return all;
    const chosen = this.place.mark();
    return all.filter((mark) => used.has(mark.id) || mark.id === chosen);
  });
  /** The traces that the marks shown are on, each whole. */
  protected readonly traces = computed(() => {
    const shown = new Set(this.marks().map((mark) => mark.trace));
    return tracesOf(this.live.marks()).filter((trace) => shown.has(trace.id));
  });
  protected readonly assigned = computed(
    () => this.workbench.station()?.marks.map((one) => one.markId) ?? [],
  );
  protected readonly label = computed(() => {
    const station = this.workbench.station();
    return station === null
      ? 'Plan of the marks'
      : `Plan of the marks with the bodies at ${station.id} ${station.name}`;
  });

  private readonly scene = computed(() => {
    const document = this.draft.document();
    const station = this.workbench.station();
    const data = this.live.data();
    return document === null || station === null || data === null
      ? null
      : { document, station, data, poses: this.live.poses() };
  });
  /** Where several motions agree with the knowns, the plan shows the first; the sheet shows all. */
  private readonly branch = computed(
    () => this.scene()?.data.answer.solution?.branches.at(0) ?? null,
  );

  protected readonly bodies = computed(() => {
    const scene = this.scene();
    if (scene === null) return [];
    const { document, station, data, poses } = scene;
    const ghosts = document.stations.flatMap((other) =>
      other.id === station.id ? [] : planBodies(document, other, data.others[other.id] ?? {}, true),
    );
    return [...ghosts, ...planBodies(document, station, poses, false)];
  });
  protected readonly vectors = computed(() => {
    const scene = this.scene();
    const branch = this.branch();
    return scene === null || branch === null
      ? []
      : planVectors(scene.document, branch, {
          velocity: this.showsVelocity(),
          acceleration: this.showsAcceleration(),
        });
  });
  protected readonly centres = computed(() => {
    const scene = this.scene();
    const branch = this.branch();
    return scene === null || branch === null
      ? []
      : planCentres(scene.document, scene.station, branch, scene.poses);
  });
  protected readonly guides = computed(() => {
    const scene = this.scene();
    return scene === null ? [] : planGuides(scene.document, scene.station, scene.poses);
  });
  protected readonly joints = computed(() => {
    const scene = this.scene();
    return scene === null ? [] : planJoints(scene.document, scene.station, scene.poses);
  });

  protected move({ markId, at }: PlanMove): void {
    this.whatIf.move(markId, at);
  }

  /** A click on a named point of a body asks for its motion. */
  protected point(at: PlanPoint): void {
    const scene = this.scene();
    if (scene === null) return;
    const key = nearestPoint(scene.document, scene.poses, at, reach);
    if (key !== null) this.place.go({ point: key });
  }
}
