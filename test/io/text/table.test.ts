/** How a text file is written: separators, decimals, headers, comments, encodings. */
import { describe, expect, it } from 'vitest';
import { memorySource } from '../../../src/io/byte-source';
import { textReader } from '../../../src/io/text/text-reader';
import { entryOf, numbersOf, openText, shapesOf } from './open-text';

describe('columns are separated', () => {
  it.each([
    ['commas', 'a,b\n1,2\n3.5,4\n'],
    ['commas', 'a, b\n1, 2\n3.5, 4\n'],
    ['tabs', 'a\tb\n1\t2\n3.5\t4\n'],
    ['semicolons', 'a;b\n1;2\n3.5;4\n'],
    ['spaces', 'a b\n1 2\n3.5 4\n'],
    ['spaces', '  a    b\n  1    2\n  3.5  4\n'],
    ['spaces', 'a  b\n1\t 2\n3.5  4\n'],
  ])('by %s', async (name, text) => {
    const file = await openText(text);
    expect(await numbersOf(file, 'a')).toEqual([1, 3.5]);
    expect(await numbersOf(file, 'b')).toEqual([2, 4]);
    expect(file.facts['columns separated by']).toContain(name);
    expect(file.notes).toEqual([]);
  });

  it.each(['\n', '\r\n', '\r'])('and lines ended by %j', async (end) => {
    for (const text of [
      ['a,b', '1,2', '3,4', ''],
      ['a,b', '1,2', '3,4'],
      ['a,b', '', '1,2', '', '3,4', '', ''],
    ]) {
      const file = await openText(text.join(end));
      expect(await numbersOf(file, 'b')).toEqual([2, 4]);
    }
  });

  it('with a separator after the last cell too', async () => {
    for (const text of [
      'a,b,\n1,2,\n3,4,\n',
      'a,b\n1,2,\n3,4,\n',
      'a,b,\n1,2\n3,4\n',
      'a,b,,,\n1,2,,,\n3,4,,,\n',
    ]) {
      const file = await openText(text);
      expect(shapesOf(file)).toEqual(['a 2 uint8', 'b 2 uint8']);
    }
  });
});

describe('decimal commas', () => {
  it.each([
    ['semicolons', 'a;b\n-48,35;120,0000\n4002,21;808,0000\n'],
    ['tabs', 'a\tb\n-48,35\t120,0000\n4002,21\t808,0000\n'],
    ['spaces', 'a b\n-48,35 120,0000\n4002,21 808,0000\n'],
  ])('are read between %s, and said', async (_, text) => {
    const file = await openText(text);
    expect(await numbersOf(file, 'a')).toEqual([-48.35, 4002.21]);
    expect(shapesOf(file)[1]).toBe('b 2 uint16');
    expect(file.notes).toEqual(['Commas were read as decimal marks.']);
  });

  it('are read between commas where every such cell is between quotes', async () => {
    const file = await openText('"nm","counts"\n"599,778","0,2836"\n"600,742","-1,5"\n');
    expect(await numbersOf(file, 'nm')).toEqual([599.778, 600.742]);
    expect(await numbersOf(file, 'counts')).toEqual([0.2836, -1.5]);
  });

  it('may stand in the header alone', async () => {
    const file = await openText('x;y;600;601,25\n0;0;5;6\n1;0;7;8\n');
    expect(await numbersOf(file, 'axis')).toEqual([600, 601.25]);
  });

  it.each([
    ['wavelength_nm,counts\n599,778,120,5\n600,742,130,5\n', 3 - 1],
    ['wavelength_nm,counts\n599,778,120\n600,742,130\n', 2],
    ['599,778,0,0836\n600,742,0,1236\n', 1],
    ['1,02\n1,03\n1,05\n', 1],
  ])('are refused between commas', async (text, line) => {
    await expect(openText(text)).rejects.toMatchObject({
      kind: 'scan',
      what: expect.stringContaining('commas seem to separate the columns and to mark the decimals'),
      where: `table.csv: line ${line}`,
      hint: expect.stringContaining('semicolons or tabs'),
    });
  });

  it('are not suspected in columns of whole numbers', async () => {
    expect(shapesOf(await openText('pixel,counts\n0,120\n1,07\n'))).toHaveLength(2);
    expect(shapesOf(await openText('0,120\n1,130\n2,99\n'))).toHaveLength(2);
    expect(shapesOf(await openText('0,120,4\n1,130,4\n2,99,4\n'))).toHaveLength(3);
  });
});

describe('a header', () => {
  it.each([
    ['under comments and free lines', '# made by hand\nlaser: 532 nm\n\na,b\n1,2\n3,4\n'],
    ['in a comment, as NumPy writes it', '# a,b\n1,2\n3,4\n'],
    ['in the last of several comments', '# exposure: 2 s\n# a,b\n1,2\n3,4\n'],
    ['between quotes', '"a","b"\n1,2\n3,4\n'],
    ['with comments below', 'a,b\n# one\n// two\n1,2\n3,4\n'],
    ['after a byte order mark', '\ufeffa,b\n1,2\n3,4\n'],
    ['above a line of dashes', 'a,b\n---,---\n1,2\n3,4\n'],
    ['after the line some programs begin with', 'sep=,\na,b\n1,2\n3,4\n'],
    ['under a padded title', 'My scan,,\na,b,\n1,2,\n3,4,\n'],
  ])('is found %s', async (_, text) => {
    const file = await openText(text);
    expect(file.entries.map(({ path }) => path)).toEqual(['a', 'b']);
    expect(await numbersOf(file, 'a')).toEqual([1, 3]);
  });

  it('may have a line of units below', async () => {
    const file = await openText('Wavelength,Signal\n(nm),a.u.\n600,2\n601,4\n');
    expect(entryOf(file, 'Wavelength').attributes.units).toBe('nm');
    expect(entryOf(file, 'Signal').attributes.units).toBe('a.u.');
    const comment = await openText('# Wavelength\tSignal\n# nm\tcounts\n600\t2\n601\t4\n');
    expect(entryOf(comment, 'Wavelength').attributes.units).toBe('nm');
  });

  it('may have headings of several words between spaces', async () => {
    const file = await openText('Raman shift   Intensity\n100.5   7\n101.5   8\n');
    expect(file.entries.map(({ path }) => path)).toEqual(['Raman shift', 'Intensity']);
  });

  it('may hold line ends between quotes', async () => {
    const file = await openText('"Wavelength\n(nm)","Counts"\n600,2\n601,oops\n').catch(
      (error: unknown) => error,
    );
    expect(file).toMatchObject({ where: 'table.csv: line 4, Counts' });
    const good = await openText('"Wavelength\r\n(nm)","Counts"\r\n600,2\r\n601,3\r\n');
    expect(good.entries.map(({ path }) => path)).toEqual(['Wavelength (nm)', 'Counts']);
    expect(await numbersOf(good, 'Counts')).toEqual([2, 3]);
  });

  it('may leave the column of row names without a name', async () => {
    const file = await openText('wavelength\tcounts\n1\t600\t2\n2\t601\t4\n');
    expect(file.entries.map(({ path }) => path)).toEqual(['column 1', 'wavelength', 'counts']);
    expect(file.notes[0]).toContain('one name fewer');
    const comma = await openText(',wavelength,counts\n0,600,2\n1,601,4\n');
    expect(comma.entries.map(({ path }) => path)).toEqual(['column 1', 'wavelength', 'counts']);
  });

  it('with another number of cells is not used, and that is said', async () => {
    const file = await openText('alpha,beta,gamma,delta\n1.5,2,3\n4.5,5,6\n7.5,5,6\n');
    expect(file.entries.map(({ path }) => path)).toEqual(['column 1', 'column 2', 'column 3']);
    expect(file.notes[0]).toBe(
      'Line 1 above the numbers has 4 cells where the rows have 3, so it was not taken for their header.',
    );
  });
});

describe('free lines become facts', () => {
  it('whatever stands between name and value', async () => {
    const lines = [
      'Sample: flake 3',
      '# laser: 532 nm',
      '% exposure_s = 0.5',
      '; Grating:\t600 l/mm',
      'Detector temperature\t-70',
      'no statement at all',
      'laser: 633 nm',
      'wavelength_nm\tcounts',
      '600\t1',
      '601\t2',
    ];
    const { facts } = await openText(lines);
    expect(facts).toMatchObject({
      Sample: 'flake 3',
      laser: '532 nm',
      exposure_s: 0.5,
      Grating: '600 l/mm',
      'Detector temperature': -70,
    });
    expect(Object.keys(facts)).toHaveLength(6);
  });

  it('without touching any other object', async () => {
    const { facts } = await openText('__proto__: 1\nconstructor: 2\na,b\n1,2\n3,4\n');
    expect(Object.keys(facts)).toContain('__proto__');
    expect(({} as Record<string, unknown>).polluted).toBeUndefined();
    expect(Object.getPrototypeOf({})).toBe(Object.prototype);
  });
});

describe('comments', () => {
  it('may stand anywhere', async () => {
    const file = await openText('a;b\n# "5 inch\n1;2\n  // more\n% and more\n3;4\n# the end');
    expect(await numbersOf(file, 'b')).toEqual([2, 4]);
    const comma = await openText('a,b\n1,2\n; a note; with signs\n3,4\n');
    expect(await numbersOf(comma, 'b')).toEqual([2, 4]);
  });

  it('are not cells without a value', async () => {
    const file = await openText('a,b\n#N/A,2\n3,4\n');
    expect(await numbersOf(file, 'a')).toEqual([Number.NaN, 3]);
  });
});

describe('text in another encoding', () => {
  const text = 'x (µm)\ty (µm)\t600\t601\n0\t0\t1\t2\n1\t0\t3\t4\n';
  const open = (bytes: Uint8Array) => textReader.open(memorySource('scan.txt', bytes));
  const wide = (isLittle: boolean): Uint8Array => {
    const bytes = new Uint8Array(2 * text.length + 2);
    const view = new DataView(bytes.buffer);
    view.setUint16(0, 0xfeff, isLittle);
    for (let i = 0; i < text.length; i++) view.setUint16(2 + 2 * i, text.charCodeAt(i), isLittle);
    return bytes;
  };

  it.each([
    ['UTF-8', new TextEncoder().encode(text)],
    ['UTF-8 with a mark', new TextEncoder().encode(`\ufeff${text}`)],
    ['UTF-16, little-endian', wide(true)],
    ['UTF-16, big-endian', wide(false)],
    ['Latin-1', Uint8Array.from(text, (sign) => sign.charCodeAt(0))],
  ])('is read: %s', async (_, bytes) => {
    expect(textReader.sniff(bytes, 'scan.txt')).toBe(true);
    const file = await open(bytes);
    expect(await numbersOf(file, 'counts')).toEqual([1, 2, 3, 4]);
    expect(entryOf(file, 'x').attributes.units).toBe('µm');
  });

  it('may turn to Latin-1 after the head', async () => {
    const rows = Array.from({ length: 30_000 }, (_, i) => `${i},${i % 7}`);
    const bytes = new TextEncoder().encode(`a,b\n${rows.join('\n')}\n# `);
    const file = await textReader.open(
      memorySource('a.csv', Uint8Array.from([...bytes, 0xb5, 0x6d, 0x0a])),
    );
    expect(entryOf(file, 'a').shape).toEqual([30_000]);
  });
});

describe('the reader', () => {
  it('knows text by its bytes, not by its name', () => {
    const sniff = (bytes: readonly number[]) => textReader.sniff(Uint8Array.from(bytes), 'a.csv');
    expect(sniff([0x31, 0x2c, 0x32, 0x0a])).toBe(true);
    expect(sniff([0x31, 0x00, 0x32, 0x0a])).toBe(false);
    expect(sniff([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0])).toBe(false);
    expect(sniff([])).toBe(false);
    expect(sniff([0x20, 0x0a])).toBe(false);
  });

  it('reports progress and can be stopped, while opening and while reading', async () => {
    const rows = Array.from({ length: 300_000 }, (_, i) => `${i},${i % 7}`);
    const bytes = new TextEncoder().encode(`a,b\n${rows.join('\n')}\n`);
    const shares: number[] = [];
    await textReader.open(memorySource('a.csv', bytes), {
      onProgress: (share) => shares.push(share),
    });
    expect(shares.length).toBeGreaterThan(2);
    expect(shares.at(-1)).toBe(1);
    expect(shares.every((share, i) => i === 0 || share >= shares[i - 1])).toBe(true);
    const stop = new AbortController();
    const opening = textReader.open(memorySource('a.csv', bytes), {
      signal: stop.signal,
      onProgress: () => stop.abort(),
    });
    await expect(opening).rejects.toMatchObject({ kind: 'cancelled' });
  });

  it('lets go of the file when closed, and when it cannot be opened', async () => {
    let closed = 0;
    const source = (text: string) => ({
      ...memorySource('a.csv', new TextEncoder().encode(text)),
      close: () => {
        closed++;
      },
    });
    (await textReader.open(source('1,2\n3,4\n'))).close();
    expect(closed).toBe(1);
    await expect(textReader.open(source('words'))).rejects.toMatchObject({ kind: 'scan' });
    expect(closed).toBe(2);
  });
});
