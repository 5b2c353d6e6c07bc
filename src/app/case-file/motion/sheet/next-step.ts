import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Draft } from '../draft';
import { type PanelName, Place } from '../place';
import { Workbench } from '../workbench';

interface Step {
  readonly text: string;
  readonly panel: PanelName;
  readonly doIt: string;
}

/** What a reconstruction that is not complete lacks first, with the way there. */
@Component({
  selector: 'app-next-step',
  imports: [MatButton],
  template: `
    @if (step(); as next) {
      <div class="step" role="status">
        <p><strong>Next:</strong> {{ next.text }}</p>
        @if (workbench.mayWork()) {
          <button matButton="outlined" type="button" (click)="place.go({ panel: next.panel })">
            {{ next.doIt }}
          </button>
        }
      </div>
    }
  `,
  styles: `
    :host {
      display: contents;
    }
    .step {
      display: flex;
      flex-wrap: wrap;
      gap: 8px 14px;
      align-items: center;
      padding: 10px 12px;
      border: 1px dashed var(--edge);
      border-radius: var(--corner);
    }
    p {
      flex: 1 1 220px;
      margin: 0;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NextStep {
  private readonly draft = inject(Draft);
  protected readonly workbench = inject(Workbench);
  protected readonly place = inject(Place);

  protected readonly step = computed((): Step | null => {
    const document = this.draft.document();
    if (document === null) return null;
    if (document.bodies.length === 0) {
      return {
        text: 'add the first body: the vehicle or the machine part whose motion is asked.',
        panel: 'bodies',
        doIt: 'Add a body',
      };
    }
    if (document.bodies.every((body) => body.points.length === 0)) {
      return {
        text: 'give the body the points that left marks, or that are asked about.',
        panel: 'bodies',
        doIt: 'Add points',
      };
    }
    const station = this.workbench.station();
    if (station === null) {
      return {
        text: 'add a station: an instant that evidence fixes.',
        panel: 'stations',
        doIt: 'Add a station',
      };
    }
    if (station.marks.length === 0 && station.poses.length === 0) {
      return {
        text: `say which points made which marks at ${station.id}, or state the pose.`,
        panel: 'marks',
        doIt: 'Assign marks',
      };
    }
    if (station.knowns.length === 0 && !station.marks.some((mark) => mark.direction)) {
      return {
        text: `say what is known of the motion at ${station.id}: a speed, a direction, a turning.`,
        panel: 'knowns',
        doIt: 'Add a known',
      };
    }
    return null;
  });
}
