import { readFileSync } from 'node:fs';
import { describe, expect, it } from '@jest/globals';
import express from 'express';
import request from 'supertest';

const vectors = JSON.parse(
  readFileSync('test/reference/vectors/content_disposition_rfc6266.json', 'utf8'),
) as { tests: { filename: string; filename_star?: string; must_not_contain?: string[] }[] };

/** How every download of the server names its file: `response.attachment(name)`. */
async function headerFor(name: string): Promise<string> {
  const app = express().get('/', (_request, response) => {
    response.attachment(name).send('x');
  });
  const answer = await request(app).get('/').expect(200);
  return answer.headers['content-disposition'];
}

describe('Content-Disposition of downloads (RFC 6266, RFC 8187)', () => {
  it.each(vectors.tests)('names $filename safely', async (vector) => {
    const header = await headerFor(vector.filename);
    expect(header).toMatch(/^attachment;/);
    if (vector.filename_star !== undefined) {
      // Percent-encoded octets stand in either case (RFC 3986, 2.1).
      expect(header.toLowerCase()).toContain(`filename*=${vector.filename_star.toLowerCase()}`);
    }
    for (const part of vector.must_not_contain ?? []) expect(header).not.toContain(part);
  });
});
