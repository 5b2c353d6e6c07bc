import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  ViewEncapsulation,
  booleanAttribute,
  effect,
  inject,
  input,
} from '@angular/core';
import { render } from 'katex';

/**
 * A formula set by KaTeX. It is built node by node (`katex.render`), never as markup, so that the
 * page's policy (no inline style attributes, Trusted Types) holds; the MathML beside the drawing is
 * what a screen reader reads. Fetched with the section that shows it: KaTeX is not in the shell.
 */
@Component({
  selector: 'ui-equation',
  template: '',
  styleUrl: './equation.scss',
  encapsulation: ViewEncapsulation.None,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Equation {
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;

  /** TeX of the formula. */
  readonly tex = input.required<string>();
  /** On a line of its own, with full-size fractions. */
  readonly display = input(false, { transform: booleanAttribute });

  constructor() {
    effect(() => {
      render(this.tex(), this.host, {
        displayMode: this.display(),
        output: 'htmlAndMathml',
        throwOnError: false,
        strict: 'ignore',
        trust: false,
      });
    });
  }
}
