import { Injectable, inject } from '@angular/core';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import { jointKinds } from '../editors/joint-kinds';
import type { LiveData } from '../live-messages';
import { Place } from '../place';
import { Workbench } from '../workbench';

/** The way back from a number to what it came from: a mark on the plan, a known's or joint's editor. */
@Injectable()
export class Traces {
  private readonly place = inject(Place);
  private readonly workbench = inject(Workbench);

  /** `id` is that of a mark, a known, a joint, or a direction that a mark gave ("mark:body.point"). */
  follow(id: string): void {
    const mark = this.markOf(id);
    if (mark !== null) {
      this.place.go({ mark });
    } else if (this.workbench.station()?.knowns.some((known) => known.id === id) === true) {
      this.place.go({ panel: 'knowns', item: id, computation: null });
    } else {
      this.place.go({ panel: 'joints', item: id, computation: null });
    }
  }

  /** What people call the mark, known or joint with this id. */
  namesOf(data: LiveData, document: ReconstructionDocument): (id: string) => string {
    const labels = new Map(this.workbench.marks().map((mark) => [mark.id, mark.label]));
    return (id) => {
      const mark = this.markOf(id);
      if (mark !== null) {
        const direction = data.answer.directions.find((one) => one.mark === mark);
        const label = labels.get(mark) ?? mark;
        return id.includes(':') && direction !== undefined
          ? `trace ${direction.trace} at mark ${label}`
          : `mark ${label}`;
      }
      const joint = document.joints.find((one) => one.id === id);
      return joint === undefined
        ? `known ${id}`
        : `${jointKinds[joint.kind].name.toLowerCase()} ${id}`;
    };
  }

  private markOf(id: string): string | null {
    const wanted = id.split(':')[0];
    return this.workbench.marks().some((mark) => mark.id === wanted) ? wanted : null;
  }
}
