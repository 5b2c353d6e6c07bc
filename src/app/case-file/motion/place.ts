import { Injectable, computed, inject } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { ActivatedRoute, Router } from '@angular/router';

export const panels = [
  'alternatives',
  'bodies',
  'joints',
  'stations',
  'marks',
  'knowns',
  'records',
] as const;
export type PanelName = (typeof panels)[number];

/** What the address says of the workbench; `null` takes a part away. */
export interface PlaceParts {
  readonly alternative?: string | null;
  readonly station?: string | null;
  /** The asked point, "body.point". */
  readonly point?: string | null;
  /** The panel that is open, and what is chosen in it. */
  readonly panel?: PanelName | null;
  readonly item?: string | null;
  /** The selected mark. */
  readonly mark?: string | null;
  /** A second point, for the relative motion. */
  readonly from?: string | null;
  readonly normal?: string | null;
  readonly computation?: string | null;
}

/** The address is the only place that knows what is chosen, so that a link shows it to a colleague. */
@Injectable()
export class Place {
  private readonly route = inject(ActivatedRoute);
  private readonly router = inject(Router);
  private readonly params = toSignal(this.route.queryParamMap, { requireSync: true });
  private readonly part = (name: keyof PlaceParts) =>
    computed(() => this.params().get(name) ?? null);

  readonly alternative = this.part('alternative');
  readonly station = this.part('station');
  readonly point = this.part('point');
  readonly item = this.part('item');
  readonly mark = this.part('mark');
  readonly from = this.part('from');
  readonly normal = this.part('normal');
  readonly computation = this.part('computation');
  readonly panel = computed(
    () => panels.find((panel) => panel === this.params().get('panel')) ?? null,
  );

  go(parts: PlaceParts): void {
    void this.router.navigate([], {
      relativeTo: this.route,
      queryParams: parts,
      queryParamsHandling: 'merge',
      replaceUrl: true,
      scroll: 'manual',
    });
  }
}
