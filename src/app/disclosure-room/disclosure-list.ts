import { ChangeDetectionStrategy, Component } from '@angular/core';
import { PageTitle } from '../ui/page-title/page-title';

@Component({
  selector: 'app-disclosure-list',
  imports: [PageTitle],
  template: `<ui-page-title text="Disclosures" />`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DisclosureList {}
