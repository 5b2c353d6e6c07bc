const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/**
 * Text for HTML and SVG. Control characters, which XML forbids and which could hide or turn text
 * round on the page, become the replacement character.
 */
export function escapeMarkup(text: string): string {
  return text
    .replace(/[\0-\x08\x0B\x0C\x0E-\x1F\x7F\u202A-\u202E\u2066-\u2069]|\p{Surrogate}/gu, '\uFFFD')
    .replace(/[&<>"']/g, (character) => entities[character]);
}
