import type { AbstractControl, FormGroup } from '@angular/forms';
import type { ApiProblem } from '../api/api-problem';

/**
 * Puts the server's messages beside the fields that they are about, under the error key `server`.
 * Returns the problem when something of it belongs to no field, to be shown above the buttons.
 */
export function showServerErrors(form: FormGroup, problem: ApiProblem): ApiProblem | null {
  let placed = 0;
  for (const { field, message } of problem.errors) {
    const control = form.get(field);
    if (control === null) continue;
    control.setErrors({ ...control.errors, server: message });
    control.markAsTouched();
    placed += 1;
  }
  return placed > 0 && placed === problem.errors.length ? null : problem;
}

/** What is wrong with a field, in words; empty when nothing is. */
export function fieldError(control: AbstractControl): string {
  const { errors } = control;
  if (errors === null) return '';
  if (typeof errors['server'] === 'string') return `${capital(errors['server'])}.`;
  if (errors['required'] || errors['blank']) return 'This is needed.';
  if (errors['email']) return 'This is not an e-mail address.';
  const length = errors as Partial<Record<'minlength' | 'maxlength', { requiredLength: number }>>;
  if (length.minlength) return `At least ${length.minlength.requiredLength} characters.`;
  if (length.maxlength) return `At most ${length.maxlength.requiredLength} characters.`;
  return 'This cannot be used.';
}

/** A text with something in it besides spaces. */
export function notBlank(control: AbstractControl): { blank: true } | null {
  return typeof control.value === 'string' && control.value.trim() === '' ? { blank: true } : null;
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
