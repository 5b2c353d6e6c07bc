import { ChangeDetectionStrategy, Component } from '@angular/core';
import { PageTitle } from '../ui/page-title/page-title';

@Component({
  selector: 'app-disclosure-summary',
  imports: [PageTitle],
  template: `<ui-page-title text="Summary" />`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DisclosureSummary {}
