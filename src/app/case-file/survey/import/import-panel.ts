import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  output,
  resource,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatCheckbox } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import { listExhibits, readText } from '#shared/contracts/exhibits';
import { importSurvey, type SurveyMapping } from '#shared/contracts/survey';
import { SurveyFileProblem } from '#shared/survey/csv-rows';
import { guessMapping, type MappingGuess } from '#shared/survey/guess-mapping';
import {
  apartFromStanding,
  readSurveyCsv,
  type SurveyReading,
} from '#shared/survey/read-survey-csv';
import { Api } from '../../../core/api/api';
import { ApiProblem } from '../../../core/api/api-problem';
import { Messages } from '../../../core/messages/messages';
import { EmptyState } from '../../../ui/empty-state/empty-state';
import { ProblemMessage } from '../../../ui/problem-message/problem-message';
import { CurrentCase } from '../../current-case';
import { counted } from '../show-mark';
import { SurveyMarks } from '../survey-marks';
import { ImportPreview } from './import-preview';
import { MappingForm } from './mapping-form';
import { surveyFiles } from './survey-files';

type Told<T> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly message: string };

/** Marks from a survey file that is an exhibit: choose, say how it is read, look, import. */
@Component({
  selector: 'app-import-panel',
  imports: [
    EmptyState,
    ImportPreview,
    MappingForm,
    MatButton,
    MatCheckbox,
    MatFormFieldModule,
    MatInput,
    ProblemMessage,
    RouterLink,
  ],
  templateUrl: './import-panel.html',
  styleUrl: './import-panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ImportPanel {
  private readonly api = inject(Api);
  private readonly current = inject(CurrentCase);
  private readonly messages = inject(Messages);
  private readonly survey = inject(SurveyMarks);

  readonly imported = output();
  readonly cancelled = output();

  private readonly exhibits = resource({
    params: () => this.current.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(listExhibits, { params: { caseId }, abort }),
  });
  protected readonly files = computed(() =>
    this.exhibits.hasValue() ? surveyFiles(this.exhibits.value().items) : null,
  );
  private readonly fileId = signal('');
  protected readonly file = computed(
    () => this.files()?.find((file) => file.fileId === this.fileId()) ?? null,
  );
  private readonly loading = resource({
    params: () => this.file() ?? undefined,
    loader: ({ params: { exhibitId, fileId }, abortSignal: abort }) =>
      this.api.call(readText, { params: { caseId: this.current.id(), exhibitId, fileId }, abort }),
  });
  protected readonly text = computed(() =>
    this.loading.hasValue() ? this.loading.value().text : null,
  );
  protected readonly isLoading = computed(
    () => this.exhibits.isLoading() || this.loading.isLoading(),
  );
  protected readonly loadProblem = computed(() => {
    const error = this.exhibits.error() ?? this.loading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });

  protected readonly delimiter = signal<SurveyMapping['delimiter'] | undefined>(undefined);
  protected readonly guess = computed<Told<MappingGuess> | null>(() => {
    const text = this.text();
    return text === null ? null : reading(() => guessMapping(text, this.delimiter()));
  });
  private readonly mapping = signal<SurveyMapping | null>(null);
  protected readonly preview = computed<Told<SurveyReading> | null>(() => {
    const [text, mapping] = [this.text(), this.mapping()];
    if (text === null || mapping === null) return null;
    const standing = new Set(this.survey.marks().map((mark) => mark.label));
    return reading(() => apartFromStanding(readSurveyCsv(text, mapping), standing, mapping));
  });

  protected readonly strict = signal(false);
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);
  /** A retry of the same import sends the same key; whatever changes it makes it another act. */
  private act = { what: '', key: '' };
  protected readonly mayImport = computed(() => {
    const preview = this.preview();
    if (!preview?.ok || preview.value.rows.length === 0) return false;
    return !this.strict() || preview.value.rejected.length === 0;
  });

  protected choose(fileId: string): void {
    this.mapping.set(null);
    this.delimiter.set(undefined);
    this.problem.set(null);
    this.fileId.set(fileId);
  }

  protected divideBy(delimiter: SurveyMapping['delimiter'] | undefined): void {
    this.mapping.set(null);
    this.delimiter.set(delimiter);
  }

  protected take(mapping: SurveyMapping | null): void {
    this.mapping.set(mapping);
  }

  protected async import(): Promise<void> {
    const [file, mapping] = [this.file(), this.mapping()];
    if (file === null || mapping === null || this.busy()) return;
    const { exhibitId, fileId } = file;
    const body = { exhibitId, fileId, mapping, strict: this.strict() };
    const what = JSON.stringify(body);
    if (this.act.what !== what) this.act = { what, key: crypto.randomUUID() };
    this.busy.set(true);
    this.problem.set(null);
    try {
      const done = await this.api.call(importSurvey, {
        params: { caseId: this.current.id() },
        body,
        idempotencyKey: this.act.key,
      });
      this.messages.done(
        `${counted(done.accepted, 'mark')} imported, ${counted(done.rejected.length, 'row')} rejected.`,
      );
      this.survey.reload();
      this.imported.emit();
    } catch (error) {
      this.problem.set(ApiProblem.from(error));
    } finally {
      this.busy.set(false);
    }
  }
}

function reading<T>(read: () => T): Told<T> {
  try {
    return { ok: true, value: read() };
  } catch (error) {
    if (!(error instanceof SurveyFileProblem)) throw error;
    return { ok: false, message: error.message };
  }
}
