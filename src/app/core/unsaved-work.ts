import { inject } from '@angular/core';
import type { CanDeactivateFn } from '@angular/router';
import { Dialogs } from '../ui/confirm-dialog/dialogs';

/** A section that may hold what its user has not saved yet. */
export interface HoldsWork {
  hasUnsavedWork(): boolean;
}

/** Asks before unsaved work is left. Sections without `hasUnsavedWork` are left freely. */
export const unsavedWork: CanDeactivateFn<Partial<HoldsWork>> = (section) => {
  if (!section.hasUnsavedWork?.()) return true;
  return inject(Dialogs).confirm({
    title: 'Leave without saving?',
    text: 'What you changed on this page is not saved yet.',
    yes: 'Leave without saving',
    no: 'Stay here',
  });
};
