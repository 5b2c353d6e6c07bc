import { Injectable, computed, inject } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { ActivatedRoute, Router } from '@angular/router';
import { markKinds } from '#shared/contracts/survey';

export const panels = ['enter', 'edit', 'withdraw', 'import', 'imports', 'changes'] as const;
export type Panel = (typeof panels)[number];

/** The address says what is filtered, selected and open, so that a link shows it to a colleague. */
@Injectable()
export class Place {
  private readonly route = inject(ActivatedRoute);
  private readonly router = inject(Router);
  private readonly params = toSignal(this.route.queryParamMap, { requireSync: true });

  readonly kind = computed(
    () => markKinds.find((kind) => kind === this.params().get('kind')) ?? null,
  );
  readonly trace = computed(() => this.params().get('trace'));
  /** Id of the selected mark. */
  readonly mark = computed(() => this.params().get('mark'));
  readonly panel = computed(
    () => panels.find((panel) => panel === this.params().get('panel')) ?? null,
  );

  go(parts: {
    kind?: string | null;
    trace?: string | null;
    mark?: string | null;
    panel?: Panel | null;
  }): Promise<boolean> {
    return this.router.navigate([], {
      relativeTo: this.route,
      queryParams: parts,
      queryParamsHandling: 'merge',
      replaceUrl: true,
      scroll: 'manual',
    });
  }
}
