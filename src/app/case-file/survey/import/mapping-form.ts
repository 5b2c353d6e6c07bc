import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  output,
  untracked,
} from '@angular/core';
import { takeUntilDestroyed, toSignal } from '@angular/core/rxjs-interop';
import {
  type FormControl,
  FormRecord,
  NonNullableFormBuilder,
  ReactiveFormsModule,
  Validators,
} from '@angular/forms';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { merge } from 'rxjs';
import {
  lengthUnits,
  type LengthUnit,
  markKinds,
  type MarkKind,
  type SurveyMapping,
} from '#shared/contracts/survey';
import { codesIn, type MappingGuess, type SurveyColumn } from '#shared/survey/guess-mapping';
import { fromSi } from '#shared/units/units';
import { quantity, readQuantity } from '../../../ui/quantity-field/quantity';
import { QuantityField } from '../../../ui/quantity-field/quantity-field';
import { otherSigmaRule } from '../mark-texts';
import { counted } from '../show-mark';

/** Columns that a file must have, and those that it may have. */
const needed = [
  { field: 'label', name: 'Label of the mark' },
  { field: 'x', name: 'x (east)' },
  { field: 'y', name: 'y (north)' },
] as const;
const optional = [
  { field: 'height', name: 'Height' },
  { field: 'sigmaX', name: 'Uncertainty along x, or of both' },
  { field: 'sigmaY', name: 'Uncertainty along y' },
  { field: 'code', name: 'Code' },
  { field: 'trace', name: 'Trace' },
  { field: 'order', name: 'Place in the trace' },
  { field: 'note', name: 'Note' },
] as const;

/** How a survey file is read, filled in as far as the file tells; what it does not tell is asked. */
@Component({
  selector: 'app-mapping-form',
  imports: [MatFormFieldModule, MatInput, QuantityField, ReactiveFormsModule],
  templateUrl: './mapping-form.html',
  styleUrl: './mapping-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MappingForm {
  private readonly build = inject(NonNullableFormBuilder);

  readonly guess = input.required<MappingGuess>();
  readonly text = input.required<string>();
  /** Null as long as something is not told. */
  readonly mapped = output<SurveyMapping | null>();
  readonly delimiterChanged = output<SurveyMapping['delimiter']>();

  protected readonly needed = needed;
  protected readonly optional = optional;
  protected readonly units = lengthUnits;
  protected readonly kinds = markKinds;
  protected readonly sigmaRule = otherSigmaRule;
  protected readonly counted = counted;
  protected readonly form = this.build.group({
    delimiter: this.build.control<SurveyMapping['delimiter']>(','),
    decimal: this.build.control<SurveyMapping['decimal'] | ''>('', Validators.required),
    unit: this.build.control<LengthUnit | ''>('', Validators.required),
    sigmaUnit: this.build.control<LengthUnit | ''>(''),
    sigma: ['', quantity(otherSigmaRule)],
    columns: this.build.group({
      label: ['', Validators.required],
      x: ['', Validators.required],
      y: ['', Validators.required],
      height: '',
      sigmaX: '',
      sigmaY: '',
      code: '',
      trace: '',
      order: '',
      note: '',
    } satisfies Record<SurveyColumn, unknown>),
  });
  /** What each code of the file means; codes come and go with the column that is chosen for them. */
  protected readonly codeKinds = new FormRecord<FormControl<MarkKind | ''>>({});
  private readonly changed = toSignal(merge(this.form.valueChanges, this.codeKinds.valueChanges));
  private readonly codeColumn = toSignal(this.form.controls.columns.controls.code.valueChanges, {
    initialValue: '',
  });
  protected readonly codes = computed(() => {
    const column = this.codeColumn();
    return column === '' ? [] : codesIn(this.text(), this.guess().delimiter, column);
  });
  protected readonly hasSigmaColumn = computed(() => {
    this.changed();
    const { sigmaX, sigmaY } = this.form.getRawValue().columns;
    return sigmaX !== '' || sigmaY !== '';
  });

  constructor() {
    effect(() => {
      const guess = this.guess();
      untracked(() => this.fill(guess));
    });
    effect(() => {
      const codes = this.codes();
      untracked(() => {
        const kinds = this.codeKinds;
        for (const { code, kind } of codes) {
          if (!kinds.contains(code)) kinds.addControl(code, this.build.control(kind ?? ''));
        }
        for (const code of Object.keys(kinds.controls)) {
          if (!codes.some((one) => one.code === code)) kinds.removeControl(code);
        }
      });
    });
    effect(() => {
      this.changed();
      untracked(() => this.mapped.emit(this.mapping()));
    });
    this.form.controls.delimiter.valueChanges
      .pipe(takeUntilDestroyed())
      .subscribe((delimiter) => this.delimiterChanged.emit(delimiter));
  }

  protected columnOf(field: SurveyColumn): FormControl<string> {
    return this.form.controls.columns.controls[field];
  }

  protected kindOf(code: string): FormControl<MarkKind | ''> | null {
    return this.codeKinds.controls[code] ?? null;
  }

  private fill(guess: MappingGuess): void {
    const columns = Object.fromEntries(
      Object.entries(guess.columns).map(([field, header]) => [field, header ?? '']),
    );
    this.form.controls.delimiter.setValue(guess.delimiter, { emitEvent: false });
    this.form.patchValue({
      decimal: guess.decimal ?? '',
      unit: guess.unit ?? '',
      sigmaUnit: guess.sigmaUnit ?? '',
      columns,
    });
  }

  private mapping(): SurveyMapping | null {
    const value = this.form.getRawValue();
    const { decimal, unit } = value;
    const sigma = readQuantity(value.sigma, otherSigmaRule);
    if (this.form.invalid || decimal === '' || unit === '' || !sigma.ok) return null;
    if (this.hasSigmaColumn() && value.sigmaUnit === '') return null;
    const sigmaUnit = value.sigmaUnit === '' ? unit : value.sigmaUnit;
    const columns = Object.fromEntries(
      Object.entries(value.columns).map(([field, header]) => [field, header || null]),
    );
    const told = Object.entries(this.codeKinds.getRawValue()).filter(
      (entry): entry is [string, MarkKind] => entry[1] !== '',
    );
    return {
      ...(columns as Record<SurveyColumn, string>),
      delimiter: value.delimiter,
      decimal,
      unit,
      sigmaUnit,
      sigma: sigma.value === null ? null : Number(fromSi(sigma.value, sigmaUnit).toPrecision(12)),
      kinds: Object.fromEntries(told),
    };
  }
}
