import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { beforeEach, describe, expect, it } from '@jest/globals';
import { type ReleasedSummary, readDisclosure } from '#shared/contracts/disclosure';
import { FakeApi } from '../../../test/web/fake-api';
import { figureOf, newId } from '../../../test/web/records';
import { ApiProblem } from '../core/api/api-problem';
import { DisclosureSummary } from './disclosure-summary';

const releaseId = newId();
const summary: ReleasedSummary = {
  releaseId,
  releaseNumber: 2,
  caseNumber: '2026-014',
  title: 'Spin on Marl Lane bend',
  party: 'the claimant',
  laboratory: 'Quellmere Reconstruction Laboratory',
  releasedAt: '2026-12-01T12:00:00.000Z',
  speedUnit: 'mph',
  questions: [
    { number: 1, question: 'How fast?', answer: 'About 44 mph, at the centre of gravity.' },
    { number: 2, question: 'Which wheel?', answer: '' },
  ],
  figures: [
    figureOf(),
    figureOf({
      quantity: 'angular-velocity',
      title: 'Rate of turning',
      point: null,
      pointName: 'car',
      value: 1.92,
      low: 1.74,
      high: 2.1,
    }),
  ],
  dependsOn: 'The grip of the road.',
  against: 'The road dried.',
  exhibits: [{ number: '2026-014/1', kind: 'photographs', description: 'The bend' }],
  withheld: [{ exhibit: '2026-014/3', reason: 'privileged', explanation: 'Letter to counsel' }],
  caution: 'For use by a qualified person.',
};
const hash = 'cd'.repeat(32);

describe('the summary for an attorney', () => {
  let api: FakeApi;
  let fixture: ComponentFixture<DisclosureSummary>;

  beforeEach(() => {
    api = new FakeApi();
    TestBed.configureTestingModule({ providers: [provideRouter([]), api.provider()] });
  });

  async function open(): Promise<HTMLElement> {
    fixture = TestBed.createComponent(DisclosureSummary);
    fixture.componentRef.setInput('releaseId', releaseId);
    await fixture.whenStable();
    return fixture.nativeElement as HTMLElement;
  }

  it('when it is opened, then answers, figures with ranges in both units, and both lists are there', async () => {
    api.on(readDisclosure, () => ({
      summary,
      archive: { ready: true, size: 212_000_000, sha256: hash },
    }));
    const page = await open();
    const text = page.textContent;
    expect(text).toContain('About 44 mph, at the centre of gravity.');
    expect(text).toContain('Not answered in this release.');
    // 19.78 m/s between 18.64 and 20.92: half-width 2.55 mph, so tenths; 1.14 m/s, so tenths.
    expect(text).toContain('44.2 mph');
    expect(text).toContain('41.7 to 46.8');
    expect(text).toContain('19.8 m/s');
    expect(text).toContain('110°/s');
    expect(text).toContain('2026-014/1');
    expect(text).toContain('Letter to counsel');
    expect(text).toContain('For use by a qualified person.');
  });

  it('when the archive is ready, then it can be fetched and its hash compared', async () => {
    api.on(readDisclosure, () => ({
      summary,
      archive: { ready: true, size: 212_000_000, sha256: hash },
    }));
    const page = await open();
    const link = [...page.querySelectorAll('a')].find((one) => one.hasAttribute('download'));
    expect(link?.getAttribute('href')).toBe(`/api/disclosures/${releaseId}/archive`);
    expect(link?.textContent).toContain('Download the archive, 212 MB');
    expect(page.textContent).toContain(hash);
  });

  it('when the archive is not ready, then there is nothing to fetch', async () => {
    api.on(readDisclosure, () => ({
      summary,
      archive: { ready: false, size: null, sha256: null },
    }));
    const page = await open();
    expect(page.textContent).toContain('The archive is not ready yet.');
    expect([...page.querySelectorAll('a')].some((one) => one.hasAttribute('download'))).toBe(false);
  });

  it('when a term of mechanics stands in an answer, then it explains itself', async () => {
    api.on(readDisclosure, () => ({
      summary,
      archive: { ready: false, size: null, sha256: null },
    }));
    const page = await open();
    const terms = [...page.querySelectorAll('button')].map((button) => button.textContent);
    expect(terms).toContain('centre of gravity');
  });

  it('when it was withdrawn, then that is said in place of it', async () => {
    api.on(
      readDisclosure,
      () => new ApiProblem(404, 'Not found', 'This does not exist or is not open to you.'),
    );
    expect((await open()).textContent).toContain('is not open to you');
  });
});
