import { describe, expect, it } from 'vitest';
import { parseByteRange } from '../../../src/cli/server/byte-range';

describe('parseByteRange', () => {
  // RFC 9110, section 14.1.2: the examples for a representation of 10 000 bytes.
  it.each([
    ['bytes=0-499', 0, 499],
    ['bytes=500-999', 500, 999],
    ['bytes=-500', 9500, 9999],
    ['bytes=9500-', 9500, 9999],
    ['bytes=0-0', 0, 0],
    ['bytes=-1', 9999, 9999],
  ])('reads %s of the standard', (header, first, last) => {
    expect(parseByteRange(header, 10_000)).toEqual({ kind: 'part', first, last });
  });

  it('ends at the last byte where more is asked for', () => {
    expect(parseByteRange('bytes=90-500', 100)).toEqual({ kind: 'part', first: 90, last: 99 });
    expect(parseByteRange('bytes=-500', 100)).toEqual({ kind: 'part', first: 0, last: 99 });
  });

  it('cannot satisfy what begins behind the end, or the last 0 bytes', () => {
    expect(parseByteRange('bytes=100-', 100)).toEqual({ kind: 'unsatisfiable' });
    expect(parseByteRange('bytes=-0', 100)).toEqual({ kind: 'unsatisfiable' });
    expect(parseByteRange('bytes=0-', 0)).toEqual({ kind: 'unsatisfiable' });
  });

  it.each([
    undefined,
    '',
    'bytes=',
    'bytes=-',
    'bytes=5-4',
    'bytes=0-1,5-6',
    'lines=0-1',
    'bytes=a-b',
  ])('gives the whole file for %j', (header) => {
    expect(parseByteRange(header, 100)).toEqual({ kind: 'whole' });
  });
});
