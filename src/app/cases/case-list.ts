import { ChangeDetectionStrategy, Component } from '@angular/core';
import { PageTitle } from '../ui/page-title/page-title';

@Component({
  selector: 'app-case-list',
  imports: [PageTitle],
  template: `<ui-page-title text="Cases" />`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CaseList {}
