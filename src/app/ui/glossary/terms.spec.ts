import { describe, expect, it } from '@jest/globals';
import { explain } from './terms';

const explained = (text: string): string[] =>
  explain(text)
    .filter((part) => part.meaning !== null)
    .map((part) => part.text);

describe('the glossary', () => {
  it('finds the longest term and explains it once', () => {
    const text = 'The centre of gravity moved; the Centre of gravity is a point.';
    expect(explained(text)).toEqual(['centre of gravity']);
    expect(
      explain(text)
        .map((part) => part.text)
        .join(''),
    ).toBe(text);
  });

  it('does not find terms inside other words', () => {
    expect(explained('The stations retraced the path.')).toEqual([]);
  });

  it('leaves a text without terms whole', () => {
    expect(explain('Nothing to explain.')).toEqual([
      { text: 'Nothing to explain.', meaning: null },
    ]);
  });
});
