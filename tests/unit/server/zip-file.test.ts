import { strToU8, Zip, zipSync, ZipPassThrough } from 'fflate';
import { describe, expect, test } from 'vitest';
import { importFirm } from '@/server/archive/import';
import { bytesInMemory, unzipped, zipEntries } from '@/server/archive/zip-file';

const text = (bytes: Uint8Array) => new TextDecoder().decode(bytes);

/** Where the list of files begins with its entry of the only file, by the end record (APPNOTE.TXT 6.3.10, 4.3.16). */
const listAt = (zip: Uint8Array) => new DataView(zip.buffer).getUint32(zip.length - 22 + 16, true);

describe('reading a ZIP written by another library', () => {
  test('packed, plain and empty files come out as they went in', async () => {
    const long = 'course after course, '.repeat(5000);
    const zip = bytesInMemory(
      zipSync({
        'a/long.txt': strToU8(long),
        'plain.txt': [strToU8('as it is'), { level: 0 }],
        'empty.txt': new Uint8Array(),
        'Fläche.txt': strToU8('ä'),
      }),
    );
    const entries = await zipEntries(zip);
    expect([...entries.keys()]).toEqual(['a/long.txt', 'plain.txt', 'empty.txt', 'Fläche.txt']);
    const read = async (name: string) => text(await unzipped(zip, entries.get(name)!));
    expect(await read('a/long.txt')).toBe(long);
    expect(await read('plain.txt')).toBe('as it is');
    expect(await read('empty.txt')).toBe('');
    expect(await read('Fläche.txt')).toBe('ä');
  });

  test('lists every one of more files than its end record can count', async () => {
    const chunks: Uint8Array[] = [];
    const zip = new Zip((error, bytes) => {
      if (error) throw error;
      chunks.push(bytes);
    });
    for (let n = 0; n < 66_000; n += 1) {
      const file = new ZipPassThrough(`v/${n}`);
      zip.add(file);
      file.push(strToU8(String(n)), true);
    }
    zip.end();
    const bytes = bytesInMemory(Buffer.concat(chunks));
    const entries = await zipEntries(bytes);
    expect(entries.size).toBe(66_000);
    expect(text(await unzipped(bytes, entries.get('v/65999')!))).toBe('65999');
  });

  test('a byte that was altered is noticed', async () => {
    const zip = zipSync({ 'plain.txt': [strToU8('as it is'), { level: 0 }] });
    zip[30 + 'plain.txt'.length] ^= 1;
    const bytes = bytesInMemory(zip);
    const entry = (await zipEntries(bytes)).get('plain.txt')!;
    await expect(unzipped(bytes, entry)).rejects.toThrow('plain.txt is broken');
  });

  test('a file that unpacks to more than it says is not unpacked', async () => {
    const zip = zipSync({ 'bomb.txt': strToU8('0'.repeat(100_000)) });
    new DataView(zip.buffer).setUint32(listAt(zip) + 24, 10, true);
    const bytes = bytesInMemory(zip);
    const entry = (await zipEntries(bytes)).get('bomb.txt')!;
    await expect(unzipped(bytes, entry)).rejects.toThrow('bomb.txt cannot be unpacked');
  });

  test.each([
    ['cut short', (zip: Uint8Array) => zip.slice(0, zip.length - 30)],
    ['with a head missing', (zip: Uint8Array) => zip.slice(40)],
    ['of nothing', () => new Uint8Array()],
  ])('one %s is no ZIP', async (_name, spoil) => {
    const zip = bytesInMemory(spoil(zipSync({ 'a.txt': strToU8('a'.repeat(100)) })));
    const open = async () => {
      const entries = await zipEntries(zip);
      for (const entry of entries.values()) await unzipped(zip, entry);
    };
    await expect(open()).rejects.toThrow();
  });

  test('a file too large to be read in is refused by its size, before it is unpacked', async () => {
    const zip = zipSync({ 'archive.json': strToU8('{}') });
    new DataView(zip.buffer).setUint32(listAt(zip) + 24, 700_000_001, true);
    const untouched = null as never;
    expect(await importFirm(untouched, bytesInMemory(zip))).toMatchObject({
      ok: false,
      detail: expect.stringMatching(/archive\.json is 701 MB unpacked.*more than 400 MB/),
    });
  });
});
