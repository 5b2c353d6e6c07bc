import { crc32, deflateSync } from 'node:zlib';

/** Hand-made containers for the bad-input samples, which no honest library would write. */

function littleEndian(...fields: readonly (readonly [bytes: 2 | 4, value: number])[]): Buffer {
  return Buffer.concat(
    fields.map(([bytes, value]) => {
      const field = Buffer.alloc(bytes);
      field.writeUIntLE(value, 0, bytes);
      return field;
    }),
  );
}

/** A ZIP with stored entries under exactly the given names, dated 2026-01-01. */
export function storedZip(entries: readonly (readonly [name: string, content: string])[]): Buffer {
  const date = ((2026 - 1980) << 9) | (1 << 5) | 1;
  const locals: Buffer[] = [];
  const directory: Buffer[] = [];
  let offset = 0;
  for (const [name, content] of entries) {
    const data = Buffer.from(content);
    const title = Buffer.from(name);
    const common = littleEndian(
      [2, 20],
      [2, 0],
      [2, 0],
      [2, 0],
      [2, date],
      [4, crc32(data)],
      [4, data.length],
      [4, data.length],
      [2, title.length],
      [2, 0],
    );
    const local = Buffer.concat([littleEndian([4, 0x04034b50]), common, title, data]);
    const place = littleEndian([2, 0], [2, 0], [2, 0], [4, 0], [4, offset]);
    directory.push(littleEndian([4, 0x02014b50], [2, 20]), common, place, title);
    locals.push(local);
    offset += local.length;
  }
  const central = Buffer.concat(directory);
  const end = littleEndian(
    [4, 0x06054b50],
    [2, 0],
    [2, 0],
    [2, entries.length],
    [2, entries.length],
    [4, central.length],
    [4, offset],
    [2, 0],
  );
  return Buffer.concat([...locals, central, end]);
}

/** A greyscale PNG that declares `width` by `height` pixels but carries only a few rows. */
export function overdeclaredPng(width: number, height: number): Buffer {
  const chunk = (type: string, data: Buffer): Buffer => {
    const body = Buffer.concat([Buffer.from(type, 'latin1'), data]);
    const frame = Buffer.alloc(8);
    frame.writeUInt32BE(data.length, 0);
    frame.writeUInt32BE(crc32(body), 4);
    return Buffer.concat([frame.subarray(0, 4), body, frame.subarray(4)]);
  };
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  header.writeUInt8(8, 8);
  return Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    chunk('IHDR', header),
    chunk('IDAT', deflateSync(Buffer.alloc((width + 1) * 8))),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}
