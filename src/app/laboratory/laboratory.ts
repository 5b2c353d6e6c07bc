import { ChangeDetectionStrategy, Component } from '@angular/core';
import { PageTitle } from '../ui/page-title/page-title';

@Component({
  selector: 'app-laboratory',
  imports: [PageTitle],
  template: `<ui-page-title text="Laboratory" />`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Laboratory {}
