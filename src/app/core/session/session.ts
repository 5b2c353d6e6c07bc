import { Injectable, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { Router } from '@angular/router';
import { type Account, readSession, signIn, signOut } from '#shared/contracts/accounts';
import { Api } from '../api/api';
import { ApiProblem } from '../api/api-problem';

/** Who is signed in. */
@Injectable({ providedIn: 'root' })
export class Session {
  private readonly api = inject(Api);
  private readonly router = inject(Router);

  private readonly current = signal<Account | null>(null);
  readonly account = this.current.asReadonly();
  readonly role = computed(() => this.current()?.role ?? null);
  readonly isLead = computed(() => this.role() === 'laboratory-lead');
  readonly isStaff = computed(() => this.isLead() || this.role() === 'investigator');
  /** Why the session could not be read when the application started. */
  readonly problem = signal<ApiProblem | null>(null);

  constructor() {
    this.api.signedOut.pipe(takeUntilDestroyed()).subscribe(() => void this.lost());
  }

  async load(): Promise<void> {
    try {
      this.take(await this.api.call(readSession, {}));
      this.problem.set(null);
    } catch (error) {
      this.problem.set(ApiProblem.from(error));
    }
  }

  async signIn(email: string, password: string): Promise<void> {
    this.take(await this.api.call(signIn, { body: { email, password } }));
  }

  async signOut(): Promise<void> {
    await this.api.call(signOut, {});
    this.current.set(null);
    // The server begins a new session, which has its own token.
    await this.load();
    await this.router.navigate(['/sign-in']);
  }

  /** The page that an account begins on. */
  home(): string {
    if (this.current() === null) return '/sign-in';
    return this.isStaff() ? '/cases' : '/disclosures';
  }

  private take(session: { account: Account | null; csrfToken: string }): void {
    this.current.set(session.account);
    this.api.csrfToken.set(session.csrfToken);
  }

  private async lost(): Promise<void> {
    if (this.current() === null) return;
    this.current.set(null);
    await this.load();
    await this.router.navigate(['/sign-in'], { queryParams: { to: this.router.url } });
  }
}
