import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { addJoint, numberedKey, removeJoint } from '../document-edits';
import { Draft } from '../draft';
import { namesIn } from '../names';
import { Place } from '../place';
import { Faults } from './faults';
import { JointForm } from './joint-form';
import { jointKinds, jointOf } from './joint-kinds';

/** How the bodies hang together. */
@Component({
  selector: 'app-joints-editor',
  imports: [JointForm, MatButton],
  template: `
    <p class="note">
      A joint holds at every station unless it is taken off there (a wheel that slides).
    </p>
    <ul class="list">
      @for (joint of joints(); track joint.id) {
        <li>
          <button
            class="row"
            type="button"
            [attr.aria-expanded]="place.item() === joint.id"
            (click)="choose(place.item() === joint.id ? null : joint.id)"
          >
            {{ kinds[joint.kind].name }} {{ joint.id }}
            <span class="end">{{ joins(joint) }}</span>
          </button>
          @if (place.item() === joint.id) {
            @if (faults.at('joints.' + joint.id); as fault) {
              <p class="fault" role="status">{{ fault }}</p>
            }
            <app-joint-form [joint]="joint" />
            <div class="actions form">
              <button matButton type="button" (click)="remove(joint.id)">
                Remove joint {{ joint.id }}
              </button>
            </div>
          }
        </li>
      }
    </ul>
    @if (points().length === 0) {
      <p class="note">Joints need points: add them to the bodies first.</p>
    } @else {
      <div class="actions">
        <button matButton="outlined" type="button" (click)="add()">Add a joint</button>
      </div>
    }
  `,
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class JointsEditor {
  private readonly draft = inject(Draft);
  protected readonly place = inject(Place);
  protected readonly faults = inject(Faults);

  protected readonly kinds = jointKinds;
  protected readonly joints = computed(() => this.draft.document()?.joints ?? []);
  protected readonly points = computed(() =>
    (this.draft.document()?.bodies ?? []).flatMap((body) =>
      body.points.map((point) => ({ body: body.id, point: point.id })),
    ),
  );
  private readonly names = computed(() => namesIn(this.draft.document()));

  protected joins(joint: ReturnType<typeof this.joints>[number]): string {
    const a = this.names().point(joint.a);
    return 'b' in joint ? `${a} and ${this.names().point(joint.b)}` : a;
  }

  protected choose(id: string | null): void {
    this.place.go({ item: id });
  }

  protected add(): void {
    const id = numberedKey(
      'J',
      this.joints().map((joint) => joint.id),
    );
    const points = this.points();
    const a = points[0];
    const b = points.find((point) => point.body !== a.body) ?? points.at(-1) ?? a;
    const kind = b.body === a.body ? 'ground-pin' : 'pin';
    this.draft.edit(addJoint(jointOf(kind, id, a, b)));
    this.choose(id);
  }

  protected remove(id: string): void {
    this.draft.edit(removeJoint(id));
    this.choose(null);
  }
}
