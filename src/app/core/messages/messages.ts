import { Injectable, signal } from '@angular/core';
import { ApiProblem } from '../api/api-problem';

export interface Message {
  readonly kind: 'done' | 'fault';
  readonly text: string;
  readonly detail: string;
}

/** The one place for messages; the newest replaces the one before. */
@Injectable({ providedIn: 'root' })
export class Messages {
  private readonly shown = signal<Message | null>(null);
  readonly current = this.shown.asReadonly();
  private timer: ReturnType<typeof setTimeout> | undefined;

  /** Something was done; goes away by itself. */
  done(text: string): void {
    this.show({ kind: 'done', text, detail: '' });
    this.timer = setTimeout(() => this.clear(), 8000);
  }

  /** Something failed; stays until it is closed or replaced. */
  fault(error: unknown): void {
    const { title, detail } = ApiProblem.from(error);
    this.show({ kind: 'fault', text: title, detail });
  }

  clear(): void {
    clearTimeout(this.timer);
    this.shown.set(null);
  }

  private show(message: Message): void {
    clearTimeout(this.timer);
    this.shown.set(message);
  }
}
