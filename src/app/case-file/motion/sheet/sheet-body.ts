import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatSelectModule } from '@angular/material/select';
import type { MotionBranch } from '#shared/engine/documents/motion-solution';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import { PointSelect, type PointRef } from '../editors/point-select';
import type { LiveData } from '../live-messages';
import { keyOf, namesIn } from '../names';
import { Place } from '../place';
import { BodyTable } from './body-table';
import { BranchTable } from './branch-table';
import { Polygons } from './polygons';
import { PoseFit } from './pose-fit';
import { RelativeMotionPart } from './relative-motion';
import { ResidualTable } from './residual-table';
import { SpeedTable } from './speed-table';
import { shortNames } from './tex-names';
import { Traces } from './traces';
import { VerdictBox } from './verdict';
import { WorkingPart } from './working-part';

/** The answer of a station, written out: verdict, derivation, figures, and what they rest on. */
@Component({
  selector: 'app-sheet-body',
  imports: [
    BodyTable,
    BranchTable,
    MatFormFieldModule,
    MatSelectModule,
    PointSelect,
    Polygons,
    PoseFit,
    RelativeMotionPart,
    ResidualTable,
    SpeedTable,
    VerdictBox,
    WorkingPart,
  ],
  templateUrl: './sheet-body.html',
  styleUrl: './sheet-body.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SheetBody {
  private readonly place = inject(Place);
  private readonly traces = inject(Traces);

  readonly data = input.required<LiveData>();
  readonly document = input.required<ReconstructionDocument>();
  readonly stationName = input.required<string>();
  readonly asked = input.required<PointRef | null>();

  protected readonly solution = computed(() => this.data().answer.solution);
  protected readonly branches = computed<readonly MotionBranch[]>(
    () => this.solution()?.branches ?? [],
  );
  protected readonly names = computed(() => namesIn(this.document()));
  protected readonly bodyName = computed(() => this.names().body);
  protected readonly pointName = computed(() => this.names().point);
  protected readonly nameOf = computed(() => this.traces.namesOf(this.data(), this.document()));
  protected readonly shorten = computed(() => shortNames(this.data().answer));
  protected readonly overDetermined = computed(() => (this.solution()?.redundancy ?? 0) > 0);
  protected readonly unplaced = computed(() => {
    const { unplaced } = this.data().answer;
    return unplaced.map(this.bodyName()).join(', ');
  });
  /** What the pose fit and the glue warn of; the solution's own warnings stand with its verdict. */
  protected readonly warnings = computed(() => {
    const { warnings, solution } = this.data().answer;
    return warnings.filter((warning) => solution?.warnings.includes(warning) !== true);
  });

  protected letter(index: number): string {
    return this.branches().length > 1 ? `, motion ${index + 1}` : '';
  }

  protected ask(ref: PointRef | null): void {
    if (ref !== null) this.place.go({ point: keyOf(ref) });
  }

  protected trace(id: string): void {
    this.traces.follow(id);
  }
}
