import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatCheckbox } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatSelectModule } from '@angular/material/select';
import type { ReconstructionJoint } from '#shared/engine/documents/reconstruction';
import { putJoint } from '../document-edits';
import { Draft } from '../draft';
import { Preferences } from '../preferences';
import { type JointKind, jointKindNames, jointKinds, jointOf } from './joint-kinds';
import { PointSelect } from './point-select';
import { QuantityField } from './quantity-field';

/** One joint: its kind, its points, and the numbers that the kind has. */
@Component({
  selector: 'app-joint-form',
  imports: [MatCheckbox, MatFormFieldModule, MatSelectModule, PointSelect, QuantityField],
  templateUrl: './joint-form.html',
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class JointForm {
  private readonly draft = inject(Draft);
  protected readonly preferences = inject(Preferences);

  readonly joint = input.required<ReconstructionJoint>();

  protected readonly kinds = jointKinds;
  protected readonly kindNames = jointKindNames;
  protected readonly curved = computed(() => {
    const joint = this.joint();
    return 'radius' in joint && joint.kind !== 'roll' && joint.radius !== null;
  });

  protected change(kind: JointKind): void {
    const joint = this.joint();
    const b = 'b' in joint ? joint.b : joint.a;
    this.draft.edit(putJoint(jointOf(kind, joint.id, joint.a, b)));
  }

  /** The parts are those of the joint's own kind: the template offers no other. */
  protected put(part: Partial<ReconstructionJoint>): void {
    const joint = { ...this.joint(), ...part } as ReconstructionJoint;
    this.draft.edit(putJoint(joint), `joint ${joint.id} ${Object.keys(part).join()}`);
  }

  protected putAt(axis: 0 | 1, at: readonly [number, number], value: number | null): void {
    const part = value ?? 0;
    this.put({ at: axis === 0 ? [part, at[1]] : [at[0], part] });
  }
}
