import { signal } from '@angular/core';
import { provideRouter } from '@angular/router';
import type { Endpoint } from '#shared/contracts/endpoint';
import type { Mark } from '#shared/contracts/survey';
import { Api } from '../../core/api/api';
import { CurrentCase } from '../current-case';

export const caseId = '01930000-0000-7000-8000-000000000001';

/** A mark with 20 mm of uncertainty; specs say what matters to them. */
export const aMark = (over: Partial<Mark> = {}): Mark => ({
  id: '01930000-0000-7000-8000-0000000000aa',
  label: '101',
  kind: 'gouge',
  at: [12.5, -3.25],
  covariance: [
    [0.0004, 0],
    [0, 0.0004],
  ],
  height: null,
  trace: null,
  order: null,
  note: '',
  source: { kind: 'entry', by: 'E. Varo', raw: 'x: 12.5 m; y: -3.25 m' },
  version: 1,
  ...over,
});

export interface Sent {
  readonly endpoint: Endpoint;
  readonly request: {
    readonly body?: unknown;
    readonly ifMatch?: number;
    readonly query?: unknown;
  };
}

/** A server that answers by path and notes what was sent. An answer that is an error is thrown. */
export class FakeServer {
  readonly sent: Sent[] = [];
  private readonly answers = new Map<string, unknown>();

  answer(method: string, path: string, value: unknown): this {
    this.answers.set(`${method} ${path}`, value);
    return this;
  }

  call(endpoint: Endpoint, request: Sent['request']): Promise<unknown> {
    if (endpoint.method !== 'GET') this.sent.push({ endpoint, request });
    const path = endpoint.path.replace('/api/cases/:caseId/', '');
    const value = this.answers.get(`${endpoint.method} ${path}`);
    return value instanceof Error ? Promise.reject(value) : Promise.resolve(value);
  }
}

export const surveyProviders = (server: FakeServer, work = true) => [
  provideRouter([]),
  { provide: Api, useValue: server },
  {
    provide: CurrentCase,
    useValue: {
      id: signal(caseId),
      file: signal({ title: 'Spin', xAxisBearing: null, speedUnit: 'km/h' }),
      may: signal({ work, custody: work, direct: false, assign: false }),
      reload: () => undefined,
    },
  },
];
