import { DOCUMENT } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Icon } from '../../../ui/icon/icon';
import { Draft } from '../draft';
import { LiveAnswer } from '../live-answer';
import { WhatIf } from '../what-if';
import { Workbench } from '../workbench';
import { NextStep } from './next-step';
import { SheetBody } from './sheet-body';
import { Traces } from './traces';

/** The derivation as an engineer writes it by hand, made from the data and live while they change. */
@Component({
  selector: 'app-calculation-sheet',
  imports: [Icon, MatButton, NextStep, SheetBody],
  providers: [Traces],
  templateUrl: './calculation-sheet.html',
  styleUrl: './calculation-sheet.scss',
  host: { role: 'region', 'aria-label': 'Calculation sheet' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CalculationSheet {
  private readonly window = inject(DOCUMENT).defaultView;
  protected readonly draft = inject(Draft);
  protected readonly live = inject(LiveAnswer);
  protected readonly whatIf = inject(WhatIf);
  protected readonly workbench = inject(Workbench);

  protected readonly stationName = computed(() => {
    const station = this.workbench.station();
    return station === null ? '' : station.id;
  });
  /** Labels of the marks that were moved for trial. */
  protected readonly moved = computed(() => {
    const moved = this.whatIf.places();
    return this.workbench
      .marks()
      .filter((mark) => moved.has(mark.id))
      .map((mark) => mark.label)
      .join(', ');
  });
  /** Faults of a draft that is only begun are said by the next step. */
  protected readonly fault = computed(() => {
    const fault = this.live.fault();
    return fault?.code === 'empty' ? null : fault;
  });

  /** The plan and the sheet, as the browser prints or saves them. */
  protected print(): void {
    this.window?.print();
  }
}
