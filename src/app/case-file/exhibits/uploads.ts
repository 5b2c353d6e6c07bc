import { HttpClient, HttpEventType, HttpHeaders } from '@angular/common/http';
import { DestroyRef, Injectable, computed, inject, signal } from '@angular/core';
import { type Subscription } from 'rxjs';
import {
  type Exhibit,
  type ExhibitFile,
  downloadFile,
  exhibitFile,
  showPicture,
  uploadFile,
} from '#shared/contracts/exhibits';
import { address } from '../../core/api/address';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';

/** One file on its way to the store. */
export interface Upload {
  readonly id: number;
  readonly exhibitId: string;
  readonly file: File;
  readonly state: 'waiting' | 'sending' | 'checking' | 'done' | 'failed';
  /** Part that has been sent, 0 to 1. */
  readonly sent: number;
  readonly problem: ApiProblem | null;
  readonly takenIn: ExhibitFile | null;
}

/**
 * Sends files one after the other, each whole or not at all, and says of each how far it is and what
 * became of it. A failure of one does not stop the next.
 */
@Injectable()
export class Uploads {
  private readonly http = inject(HttpClient);
  private readonly api = inject(Api);
  private readonly list = signal<readonly Upload[]>([]);
  private running: Subscription | null = null;
  private count = 0;

  readonly all = this.list.asReadonly();
  readonly underWay = computed(() =>
    this.list().some(({ state }) => state !== 'done' && state !== 'failed'),
  );

  constructor() {
    inject(DestroyRef).onDestroy(() => this.running?.unsubscribe());
  }

  /** Files are taken in order; `taken` is called for each that arrived. */
  add(
    caseId: string,
    exhibitId: string,
    files: readonly File[],
    statedSha256: string,
    taken: (file: ExhibitFile) => void,
  ): void {
    const added = files.map((file): Upload => ({
      id: ++this.count,
      exhibitId,
      file,
      state: 'waiting',
      sent: 0,
      problem: null,
      takenIn: null,
    }));
    this.list.update((list) => [...list, ...added]);
    void this.sendAll(caseId, statedSha256, taken);
  }

  retry(upload: Upload, caseId: string, taken: (file: ExhibitFile) => void): void {
    this.change(upload.id, { state: 'waiting', sent: 0, problem: null });
    void this.sendAll(caseId, '', taken);
  }

  /** Takes a file out of the list; one that is being sent is broken off. */
  remove(upload: Upload): void {
    const { state } = this.list().find(({ id }) => id === upload.id) ?? upload;
    this.list.update((list) => list.filter(({ id }) => id !== upload.id));
    if (state === 'sending' || state === 'checking') this.running?.unsubscribe();
  }

  /** A picture for the screen; of a sensitive exhibit the blurred one, unless asked for. */
  pictureAddress(caseId: string, exhibit: Exhibit, file: ExhibitFile, veiled: boolean): string {
    const size = veiled && exhibit.sensitive ? 'thumbnail-blurred' : 'thumbnail';
    return address(showPicture, { caseId, exhibitId: exhibit.id, fileId: file.id }, { size });
  }

  screenAddress(caseId: string, exhibit: Exhibit, file: ExhibitFile): string {
    const params = { caseId, exhibitId: exhibit.id, fileId: file.id };
    return address(showPicture, params, { size: 'screen' });
  }

  originalAddress(caseId: string, exhibit: Exhibit, file: ExhibitFile): string {
    return address(downloadFile, { caseId, exhibitId: exhibit.id, fileId: file.id });
  }

  private async sendAll(
    caseId: string,
    statedSha256: string,
    taken: (file: ExhibitFile) => void,
  ): Promise<void> {
    if (this.running !== null) return;
    for (;;) {
      const next = this.list().find(({ state }) => state === 'waiting');
      if (!next) return;
      await this.send(caseId, next, statedSha256, taken);
    }
  }

  private send(
    caseId: string,
    { id, exhibitId, file }: Upload,
    statedSha256: string,
    taken: (file: ExhibitFile) => void,
  ): Promise<void> {
    const form = new FormData();
    if (statedSha256 !== '') form.set('statedSha256', statedSha256);
    form.set('file', file, file.name);
    this.change(id, { state: 'sending' });
    return new Promise((ended) => {
      this.running = this.http
        .request<unknown>(uploadFile.method, address(uploadFile, { caseId, exhibitId }), {
          body: form,
          headers: new HttpHeaders({ 'X-CSRF-Token': this.api.csrfToken() }),
          observe: 'events',
          reportProgress: true,
        })
        .subscribe({
          next: (event) => {
            if (event.type === HttpEventType.UploadProgress) {
              const sent = event.loaded / Math.max(1, event.total ?? file.size);
              this.change(id, { sent, state: sent < 1 ? 'sending' : 'checking' });
            } else if (event.type === HttpEventType.Response) {
              const takenIn = exhibitFile.parse(event.body);
              this.change(id, { state: 'done', sent: 1, takenIn });
              taken(takenIn);
            }
          },
          error: (error: unknown) => {
            this.change(id, { state: 'failed', problem: ApiProblem.from(error) });
          },
        });
      this.running.add(() => {
        this.running = null;
        ended();
      });
    });
  }

  private change(id: number, change: Partial<Upload>): void {
    this.list.update((list) =>
      list.map((upload) => (upload.id === id ? { ...upload, ...change } : upload)),
    );
  }
}
