import { ChangeDetectionStrategy, Component, inject, input, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { Router } from '@angular/router';
import { ApiProblem } from '../core/api/api-problem';
import { Session } from '../core/session/session';
import { ProblemMessage } from '../ui/problem-message/problem-message';
import { SignInDrawing } from './sign-in-drawing';

@Component({
  selector: 'app-sign-in',
  imports: [
    MatButton,
    MatFormFieldModule,
    MatInput,
    ProblemMessage,
    ReactiveFormsModule,
    SignInDrawing,
  ],
  templateUrl: './sign-in.html',
  styleUrl: './sign-in.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignIn {
  private readonly session = inject(Session);
  private readonly router = inject(Router);

  /** Where the person wanted to go. */
  readonly to = input<string>();

  protected readonly form = inject(NonNullableFormBuilder).group({
    email: ['', [Validators.required, Validators.maxLength(320)]],
    password: ['', Validators.required],
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async signIn(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    const { email, password } = this.form.getRawValue();
    try {
      await this.session.signIn(email.trim(), password);
      await this.router.navigateByUrl(this.destination());
    } catch (error) {
      this.problem.set(ApiProblem.from(error));
      this.form.controls.password.reset();
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
