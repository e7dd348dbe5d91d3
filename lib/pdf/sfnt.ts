import { readFileSync } from 'node:fs';
import { inflateSync } from 'node:zlib';
import { type Face, fontFile } from './look';

type Table = { tag: Buffer; checksum: number; length: number; data: Buffer };

const aligned = (length: number): number => (length + 3) & ~3;

function tablesOf(woff: Buffer): Table[] {
  return Array.from({ length: woff.readUInt16BE(12) }, (_, at) => {
    const entry = woff.subarray(44 + at * 20, 64 + at * 20);
    const [offset, packed, length] = [entry.readUInt32BE(4), entry.readUInt32BE(8), entry.readUInt32BE(12)];
    const data = woff.subarray(offset, offset + packed);
    return { tag: entry.subarray(0, 4), checksum: entry.readUInt32BE(16), length, data: packed < length ? inflateSync(data) : data };
  });
}

/**
 * Unpacks a WOFF 1 file into the plain font file inside it (W3C WOFF File Format 1.0, sections 3 to 5). pdfkit reads WOFF too, but
 * inflates its tables again for every glyph: a page takes seconds.
 */
export function unpackWoff(woff: Buffer): Buffer {
  if (woff.toString('latin1', 0, 4) !== 'wOFF') throw new Error('Not a WOFF file.');
  const tables = tablesOf(woff);
  const log = Math.floor(Math.log2(tables.length));
  const header = Buffer.alloc(12 + 16 * tables.length);
  header.writeUInt32BE(woff.readUInt32BE(4), 0);
  header.writeUInt16BE(tables.length, 4);
  header.writeUInt16BE(16 * 2 ** log, 6);
  header.writeUInt16BE(log, 8);
  header.writeUInt16BE(16 * tables.length - 16 * 2 ** log, 10);
  const bodies: Buffer[] = [];
  let offset = header.length;
  tables.forEach(({ tag, checksum, length, data }, at) => {
    tag.copy(header, 12 + at * 16);
    header.writeUInt32BE(checksum, 16 + at * 16);
    header.writeUInt32BE(offset, 20 + at * 16);
    header.writeUInt32BE(length, 24 + at * 16);
    bodies.push(data, Buffer.alloc(aligned(length) - length));
    offset += aligned(length);
  });
  return Buffer.concat([header, ...bodies]);
}

const kept = new Map<Face, Buffer>();

/** The plain font file of a face, unpacked once a process. */
export function fontOf(face: Face): Buffer {
  let font = kept.get(face);
  if (!font) kept.set(face, (font = unpackWoff(readFileSync(fontFile(face)))));
  return font;
}
