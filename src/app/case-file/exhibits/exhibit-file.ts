import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Exhibit, ExhibitFile } from '#shared/contracts/exhibits';
import { showMoment } from '../../ui/dates/dates';
import { Icon } from '../../ui/icon/icon';
import { sizeText } from '../../ui/size/size-text';
import { CurrentCase } from '../current-case';
import { pictureFacts } from './picture-facts';
import { Uploads } from './uploads';

/** One file of an exhibit: picture, hashes, and what its metadata says, with the doubts about it. */
@Component({
  selector: 'app-exhibit-file',
  imports: [Icon, MatButton],
  templateUrl: './exhibit-file.html',
  styleUrl: './exhibit-file.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ExhibitFileCard {
  private readonly current = inject(CurrentCase);
  private readonly uploads = inject(Uploads);

  readonly exhibit = input.required<Exhibit>();
  readonly file = input.required<ExhibitFile>();

  /** What is asked for: nothing yet, the small picture, or the large one. */
  protected readonly shown = linkedSignal<ExhibitFile, 'veiled' | 'small' | 'large'>({
    source: this.file,
    computation: (file, before) =>
      before?.source.id === file.id ? before.value : this.exhibit().sensitive ? 'veiled' : 'small',
  });
  protected readonly picture = computed(() => {
    const [id, exhibit, file] = [this.current.id(), this.exhibit(), this.file()];
    if (!file.hasThumbnail) return null;
    return this.shown() === 'large'
      ? this.uploads.screenAddress(id, exhibit, file)
      : this.uploads.pictureAddress(id, exhibit, file, this.shown() === 'veiled');
  });
  protected readonly original = computed(() =>
    this.uploads.originalAddress(this.current.id(), this.exhibit(), this.file()),
  );
  protected readonly facts = computed(() => pictureFacts(this.file().picture));
  protected readonly doubts = computed(() => this.file().picture?.doubts ?? []);
  protected readonly agrees = computed(() => {
    const { statedSha256, sha256 } = this.file();
    return statedSha256 === null ? null : statedSha256 === sha256;
  });
  protected readonly sizeText = sizeText;
  protected readonly showMoment = showMoment;
}
