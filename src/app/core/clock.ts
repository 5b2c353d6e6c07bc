import { Injectable, signal } from '@angular/core';

/** Today, where the person is. One place, so that tests can set the day. */
@Injectable({ providedIn: 'root' })
export class Clock {
  readonly today = signal(localDay(new Date()));
}

function localDay(now: Date): string {
  const two = (value: number) => String(value).padStart(2, '0');
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}
