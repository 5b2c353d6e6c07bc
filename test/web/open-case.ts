import { computed, signal } from '@angular/core';
import type { CaseFile } from '#shared/contracts/cases';
import { CurrentCase } from '../../src/app/case-file/current-case';

/** The open case of a section's spec, in place of the case frame. */
export function openCaseFile(file: CaseFile) {
  const current = signal(file);
  const fake = {
    id: signal(file.id),
    loaded: current,
    file: current,
    may: computed(() => current().may),
    problem: signal(null),
    reloads: 0,
    reload: () => (fake.reloads += 1),
    take: (taken: CaseFile) => current.set(taken),
  };
  return { fake, provider: { provide: CurrentCase, useValue: fake } };
}
