/** Text as it was read, and from which encoding. */
export interface DecodedText {
  readonly text: string;
  readonly encoding: 'UTF-8' | 'UTF-16LE' | 'UTF-16BE' | 'Windows-1252';
}

/** Control characters that no text file has; tab, line feed, form feed and return are common. */
const control = /[\u0000-\u0008\u000b\u000e-\u001a\u001c-\u001f]/;

/**
 * Reads bytes as text: by their byte order mark, else UTF-8, else Windows-1252, as spreadsheets of
 * older instruments write it. Null where it is not text at all. A `sample` may end within a character.
 */
export function decodeText(bytes: Uint8Array, sample = false): DecodedText | null {
  const mark = bytes.subarray(0, 2);
  if (mark[0] === 0xff && mark[1] === 0xfe) return decodeAs('utf-16le', 'UTF-16LE', bytes, sample);
  if (mark[0] === 0xfe && mark[1] === 0xff) return decodeAs('utf-16be', 'UTF-16BE', bytes, sample);
  return (
    decodeAs('utf-8', 'UTF-8', bytes, sample) ??
    decodeAs('windows-1252', 'Windows-1252', bytes, sample)
  );
}

function decodeAs(
  label: string,
  encoding: DecodedText['encoding'],
  bytes: Uint8Array,
  sample: boolean,
): DecodedText | null {
  try {
    const text = new TextDecoder(label, { fatal: true }).decode(bytes, { stream: sample });
    if (control.test(text)) return null;
    // Bytes of a picture rarely avoid all controls, but high ones alone do not make text either.
    if (encoding === 'Windows-1252' && !isMostlyAscii(text)) return null;
    return { text, encoding };
  } catch {
    return null;
  }
}

function isMostlyAscii(text: string): boolean {
  let ascii = 0;
  for (let i = 0; i < text.length; i++) if (text.charCodeAt(i) < 128) ascii += 1;
  return ascii >= 0.7 * text.length;
}
