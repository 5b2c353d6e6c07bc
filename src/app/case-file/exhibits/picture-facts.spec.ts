import { describe, expect, it } from '@jest/globals';
import { pictureFacts } from './picture-facts';
import { testFile } from './testing';

describe('the facts of a picture', () => {
  it('say what is there and that a zone was not told', () => {
    expect(pictureFacts(testFile().picture)).toEqual([
      { name: 'Taken', value: '2026-11-03, 14:05:22, zone not told' },
      { name: 'Camera', value: 'Invented Camera' },
      { name: 'Lens', value: '24 mm' },
      { name: 'Position', value: '47.30000° N, 8.25000° W' },
      { name: 'Size', value: '640 × 480 pixels' },
    ]);
  });

  it('are none where the file is no picture', () => {
    expect(pictureFacts(null)).toEqual([]);
  });
});
