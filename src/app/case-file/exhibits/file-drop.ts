import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { FormControl, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatProgressBar } from '@angular/material/progress-bar';
import type { Exhibit, ExhibitFile } from '#shared/contracts/exhibits';
import { Icon } from '../../ui/icon/icon';
import { sizeText } from '../../ui/size/size-text';
import { CurrentCase } from '../current-case';
import { type Upload, Uploads } from './uploads';

/** Files are dropped here or chosen; each shows how far it is, and why if it failed. */
@Component({
  selector: 'app-file-drop',
  imports: [Icon, MatButton, MatFormFieldModule, MatInput, MatProgressBar, ReactiveFormsModule],
  templateUrl: './file-drop.html',
  styleUrl: './file-drop.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FileDrop {
  private readonly uploads = inject(Uploads);
  private readonly current = inject(CurrentCase);

  readonly exhibit = input.required<Exhibit>();
  readonly takenIn = output<ExhibitFile>();

  protected readonly over = signal(false);
  /** Only for one file at a time: a hash that came with it from its giver. */
  protected readonly stated = new FormControl('', {
    nonNullable: true,
    validators: Validators.pattern(/^\s*[0-9a-fA-F]{64}\s*$/),
  });
  protected readonly own = computed(() =>
    this.uploads.all().filter(({ exhibitId }) => exhibitId === this.exhibit().id),
  );
  /** Read aloud when it changes. */
  protected readonly summary = computed(() => {
    const count = (state: Upload['state']): number =>
      this.own().filter((upload) => upload.state === state).length;
    if (this.own().length === 0) return '';
    return `${count('done')} of ${this.own().length} files taken in, ${count('failed')} failed.`;
  });
  protected readonly sizeText = sizeText;

  protected drop(event: DragEvent): void {
    event.preventDefault();
    this.over.set(false);
    this.add(event.dataTransfer?.files ?? null);
  }

  protected hover(event: DragEvent): void {
    event.preventDefault();
    this.over.set(true);
  }

  protected choose(field: HTMLInputElement): void {
    this.add(field.files);
    // The same file may be chosen again after it failed.
    field.value = '';
  }

  protected retry(upload: Upload): void {
    this.uploads.retry(upload, this.current.id(), (file) => this.takenIn.emit(file));
  }

  protected remove(upload: Upload): void {
    this.uploads.remove(upload);
  }

  protected percent({ sent }: Upload): number {
    return Math.floor(100 * sent);
  }

  private add(chosen: FileList | null): void {
    const files = [...(chosen ?? [])];
    if (files.length === 0 || this.stated.invalid) {
      this.stated.markAsTouched();
      return;
    }
    const stated = files.length === 1 ? this.stated.value.trim().toLowerCase() : '';
    this.stated.reset();
    this.uploads.add(this.current.id(), this.exhibit().id, files, stated, (file) =>
      this.takenIn.emit(file),
    );
  }
}
