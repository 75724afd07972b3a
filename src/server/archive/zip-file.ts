import { open } from 'node:fs/promises';
import { inflateRaw } from 'node:zlib';
import { promisify } from 'node:util';

/** Bytes that can be read from anywhere: a file, or what is in memory already. */
export interface Bytes {
  readonly size: number;
  /** Exactly `length` bytes from `at` on. */
  readonly read: (at: number, length: number) => Promise<Uint8Array>;
}

/** What is wrong with a ZIP file, in words. */
export class BrokenZip extends Error {}

/** A file of a ZIP: where it lies packed, and how large it is, bytes. */
export interface ZipEntry {
  readonly name: string;
  readonly method: number;
  readonly at: number;
  readonly packed: number;
  readonly size: number;
  readonly crc: number;
}

export const bytesInMemory = (bytes: Uint8Array): Bytes => ({
  size: bytes.byteLength,
  read: async (at, length) => {
    if (at < 0 || at + length > bytes.byteLength) throw new BrokenZip('it ends too early');
    return bytes.subarray(at, at + length);
  },
});

/** Hands on a file that is read bit by bit; closed afterwards. */
export const withFile = async <T>(path: string, use: (bytes: Bytes) => Promise<T>): Promise<T> => {
  const file = await open(path);
  try {
    const { size } = await file.stat();
    return await use({
      size,
      read: async (at, length) => {
        if (at < 0 || at + length > size) throw new BrokenZip('it ends too early');
        const bytes = Buffer.alloc(length);
        for (let got = 0; got < length;) {
          const { bytesRead } = await file.read(bytes, got, length - got, at + got);
          if (bytesRead === 0) throw new BrokenZip('it ends too early');
          got += bytesRead;
        }
        return bytes;
      },
    });
  } finally {
    await file.close();
  }
};

// The numbers of PKWARE's APPNOTE.TXT 6.3.10, sections 4.3.7, 4.3.12 and 4.3.16.
const LOCAL = { mark: 0x04034b50, size: 30 };
const CENTRAL = { mark: 0x02014b50, size: 46 };
const END = { mark: 0x06054b50, size: 22, longestComment: 0xffff };
const STORED = 0;
const DEFLATED = 8;
/** In place of a number that is too large for its field. */
const ELSEWHERE = 0xffffffff;

const viewOf = (bytes: Uint8Array): DataView =>
  new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);

/** Where the list of files lies, by the record at the end of every ZIP. */
const centralList = async (zip: Bytes): Promise<{ at: number; length: number }> => {
  const length = Math.min(zip.size, END.size + END.longestComment);
  const from = zip.size - length;
  const tail = viewOf(await zip.read(from, length));
  for (let at = length - END.size; at >= 0; at -= 1) {
    if (tail.getUint32(at, true) !== END.mark) continue;
    const list = { length: tail.getUint32(at + 12, true), at: tail.getUint32(at + 16, true) };
    if (list.at === ELSEWHERE) throw new BrokenZip('it is larger than 4 GB');
    if (list.at + list.length <= from + at) return list;
  }
  throw new BrokenZip('it is no ZIP file, or broken');
};

/**
 * The files of a ZIP, by name, without reading them. The list is followed to its end, not for as many as the end record says:
 * that counts to 65,535 and then begins again.
 */
export const zipEntries = async (zip: Bytes): Promise<ReadonlyMap<string, ZipEntry>> => {
  const place = await centralList(zip);
  const list = await zip.read(place.at, place.length);
  const view = viewOf(list);
  const decoder = new TextDecoder();
  const entries = new Map<string, ZipEntry>();
  for (let at = 0; at + CENTRAL.size <= list.length;) {
    if (view.getUint32(at, true) !== CENTRAL.mark)
      throw new BrokenZip('its list of files is broken');
    const [nameSize, extra, comment] = [28, 30, 32].map((field) =>
      view.getUint16(at + field, true),
    );
    const name = decoder.decode(list.subarray(at + CENTRAL.size, at + CENTRAL.size + nameSize));
    entries.set(name, {
      name,
      method: view.getUint16(at + 10, true),
      crc: view.getUint32(at + 16, true),
      packed: view.getUint32(at + 20, true),
      size: view.getUint32(at + 24, true),
      at: view.getUint32(at + 42, true),
    });
    at += CENTRAL.size + nameSize + extra + comment;
  }
  return entries;
};

/** Section 4.4.7: the CRC-32 of ISO 3309, its polynomial bit by bit backwards. */
const CRC_TABLE = Uint32Array.from({ length: 256 }, (_, byte) => {
  let crc = byte;
  for (let bit = 0; bit < 8; bit += 1) crc = crc & 1 ? (crc >>> 1) ^ 0xedb88320 : crc >>> 1;
  return crc;
});

const crc32 = (bytes: Uint8Array): number => {
  let crc = 0xffffffff;
  for (const byte of bytes) crc = (crc >>> 8) ^ CRC_TABLE[(crc ^ byte) & 0xff];
  return (crc ^ 0xffffffff) >>> 0;
};

const inflated = promisify(inflateRaw) as (
  packed: Uint8Array,
  options: { maxOutputLength: number },
) => Promise<Uint8Array>;

/** A file of a ZIP, unpacked: never more bytes than its entry says, and those that its checksum is of. */
export const unzipped = async (zip: Bytes, entry: ZipEntry): Promise<Uint8Array> => {
  const { name, method, at, packed, size, crc } = entry;
  const head = viewOf(await zip.read(at, LOCAL.size));
  if (head.getUint32(0, true) !== LOCAL.mark)
    throw new BrokenZip(`${name} is not where it should be`);
  const from = at + LOCAL.size + head.getUint16(26, true) + head.getUint16(28, true);
  const bytes = await zip.read(from, packed);
  if (method !== STORED && method !== DEFLATED)
    throw new BrokenZip(`${name} is packed in an unknown way`);
  let unpacked = bytes;
  if (method === DEFLATED) {
    try {
      unpacked = await inflated(bytes, { maxOutputLength: Math.max(1, size) });
    } catch {
      throw new BrokenZip(`${name} cannot be unpacked`);
    }
  }
  if (unpacked.byteLength !== size || crc32(unpacked) !== crc)
    throw new BrokenZip(`${name} is broken`);
  return unpacked;
};
