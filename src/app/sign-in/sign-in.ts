import { ChangeDetectionStrategy, Component } from '@angular/core';
import { PageTitle } from '../ui/page-title/page-title';

@Component({
  selector: 'app-sign-in',
  imports: [PageTitle],
  template: `<ui-page-title text="Sign in" />`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignIn {}
