import { ChangeDetectionStrategy, Component, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router } from '@angular/router';
import { ApiProblem } from '../core/api/api-problem';
import { Session } from '../core/session/session';
import { ProblemMessage } from '../ui/problem-message/problem-message';
import { SignInDrawing } from './sign-in-drawing';

/** Two plain fields: the first screen is small, so Material's form fields are not fetched for it. */
@Component({
  selector: 'app-sign-in',
  imports: [MatButton, ProblemMessage, SignInDrawing],
  templateUrl: './sign-in.html',
  styleUrl: './sign-in.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignIn {
  private readonly session = inject(Session);
  private readonly router = inject(Router);

  /** Where the person wanted to go. */
  readonly to = input<string>();

  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async signIn(
    event: Event,
    email: HTMLInputElement,
    password: HTMLInputElement,
  ): Promise<void> {
    event.preventDefault();
    if (this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      await this.session.signIn(email.value.trim(), password.value);
      await this.router.navigateByUrl(this.destination());
    } catch (error) {
      this.problem.set(ApiProblem.from(error));
      password.value = '';
      password.focus();
    } finally {
      this.busy.set(false);
    }
  }

  /** Only a path of our own: an address given from outside never leads away. */
  private destination(): string {
    const to = this.to() ?? '';
    return /^\/(?![/\\])/.test(to) && !to.startsWith('/sign-in') ? to : this.session.home();
  }
}
