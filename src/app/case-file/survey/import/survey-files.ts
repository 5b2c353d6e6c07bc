import type { Exhibit } from '#shared/contracts/exhibits';

/** A file of an exhibit that may hold a survey. */
export interface SurveyFile {
  readonly exhibitId: string;
  readonly exhibitNumber: string;
  readonly fileId: string;
  readonly name: string;
}

/** Text files of the case, those of survey exhibits first. */
export function surveyFiles(exhibits: readonly Exhibit[]): SurveyFile[] {
  return [...exhibits]
    .sort((a, b) => Number(b.kind === 'survey data') - Number(a.kind === 'survey data'))
    .flatMap((exhibit) =>
      exhibit.files
        .filter((file) => file.mediaType === 'text/csv' || file.mediaType === 'text/plain')
        .map((file) => ({
          exhibitId: exhibit.id,
          exhibitNumber: exhibit.number,
          fileId: file.id,
          name: file.name,
        })),
    );
}
