/** Terms of mechanics and of the trade in plain words, for those who do not use them every day. */
export const terms: Readonly<Record<string, string>> = {
  '95 % range':
    'The true value lies in this range with a probability of about 95 in 100, if the measurements and assumptions listed hold.',
  'coverage interval':
    'The range that holds the true value with a stated probability, here about 95 in 100.',
  'centre of gravity':
    'The point of a body at which its weight can be thought to act; for a car, low and near its middle.',
  'rate of turning': 'How fast a body turns about an upright axis, in degrees each second.',
  acceleration: 'How fast the velocity changes: in each second, by so many metres per second.',
  velocity: 'Speed together with its direction.',
  'instantaneous centre':
    'The point about which a moving body turns at one moment, as a wheel turns about the place where it touches the road.',
  'closing velocity': 'How fast two bodies approach each other at the place of contact.',
  'drag factor':
    'The slowing of a sliding or braking vehicle as a share of gravity: 0.7 means seven tenths of g.',
  'first contact': 'The moment at which two bodies touch.',
  'maximum engagement': 'The moment at which two bodies are pressed furthest into each other.',
  separation: 'The moment at which two bodies part after contact.',
  'run-out': 'The way from the collision to the point of rest.',
  'point of rest': 'Where a body came to stand.',
  'yaw mark': 'A curved tyre mark left by a wheel that rolls and slides sideways.',
  'skid mark': 'A tyre mark left by a wheel that slides without turning.',
  gouge: 'A place where a hard part dug into the road.',
  scrape: 'A mark of a part that slid along a surface.',
  'witness mark': 'A mark that one part left on another by touching it.',
  trace: 'A mark that is a line, measured at many places along it.',
  station: 'A moment of the motion at which evidence fixes where the bodies were.',
  kingpin: 'The pin about which a semi-trailer turns behind its tractor.',
  'articulation angle': 'The angle between a tractor and its trailer, seen from above.',
  jackknife: 'A tractor and trailer folding together about the pin that joins them.',
  'off-tracking': 'How far the rear wheels run inside the path of the front wheels in a bend.',
  g: 'Gravity as a measure of acceleration: 9.81 metres per second in each second.',
};

export interface TextPart {
  readonly text: string;
  /** What the words mean, if they are a term that has not been explained earlier in the text. */
  readonly meaning: string | null;
}

// Longer terms first, so that "centre of gravity" is not cut short; one-letter units are not looked for.
const pattern = new RegExp(
  `(?<![\\p{L}\\d])(${Object.keys(terms)
    .filter((term) => term.length > 1)
    .sort((a, b) => b.length - a.length)
    .join('|')})(?![\\p{L}\\d])`,
  'giu',
);

/** Cuts a text at the terms in it; each term is explained where it comes first. */
export function explain(text: string): TextPart[] {
  const parts: TextPart[] = [];
  const explained = new Set<string>();
  let from = 0;
  for (const match of text.matchAll(pattern)) {
    const term = match[0].toLowerCase();
    const meaning = terms[term];
    if (meaning === undefined || explained.has(term)) continue;
    explained.add(term);
    if (match.index > from) parts.push({ text: text.slice(from, match.index), meaning: null });
    parts.push({ text: match[0], meaning });
    from = match.index + match[0].length;
  }
  if (from < text.length) parts.push({ text: text.slice(from), meaning: null });
  return parts;
}
