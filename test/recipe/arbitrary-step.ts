/** Conditioning steps of every kind, for property tests. */
import fc from 'fast-check';
import { bin, block, file, finite, index, interval, positive, word } from './arbitrary-parts';

const off = fc.boolean();
const iterations = fc.integer({ min: 1, max: 50 });

/** One conditioning step of any kind. */
export const step = fc.oneof(
  block(
    {
      step: word('despike'),
      off,
      method: fc.constantFrom('spectral', 'neighbour'),
      threshold: positive,
    },
    ['step'],
  ),
  block({ step: word('offset'), off, counts: finite }, ['step', 'counts']),
  block({ step: word('response'), off, file }, ['step', 'file']),
  block(
    {
      step: word('calibrate'),
      off,
      points: fc.uniqueArray(fc.tuple(finite, finite), {
        minLength: 3,
        maxLength: 5,
        selector: ([measured]) => measured,
      }),
      degree: fc.integer({ min: 0, max: 2 }),
      unit: fc.constantFrom('nm', 'cm-1'),
    },
    ['step', 'points', 'unit'],
  ),
  block(
    {
      step: word('farfield'),
      off,
      file,
      scale: fc.oneof(positive, word('fit')),
      window: interval(positive),
    },
    ['step', 'file', 'window'],
  ),
  block({ step: word('baseline'), off, method: word('arpls'), smoothness: positive, iterations }, [
    'step',
    'method',
  ]),
  block(
    {
      step: word('baseline'),
      off,
      method: word('asls'),
      asymmetry: fc.double({ min: 0.001, max: 0.5, noNaN: true }),
    },
    ['step', 'method'],
  ),
  block({ step: word('baseline'), off, method: word('snip'), half_width: iterations }, [
    'step',
    'method',
  ]),
  block(
    {
      step: word('baseline'),
      off,
      method: word('polynomial'),
      degree: bin,
      windows: fc.array(interval(positive), { minLength: 1, maxLength: 3 }),
    },
    ['step', 'method'],
  ),
  block({ step: word('denoise'), off, method: word('svd'), rank: fc.oneof(bin, word('auto')) }, [
    'step',
    'method',
  ]),
  block({ step: word('align-rows'), off, max_shift_px: positive }, ['step']),
  block(
    {
      step: word('crop'),
      off,
      axis: interval(positive),
      unit: fc.constantFrom('eV', 'nm', 'cm-1'),
      x: fc.tuple(index, index),
    },
    ['step', 'axis'],
  ),
  block({ step: word('bin'), off, x: bin, y: bin, k: bin }, ['step', 'k']),
);
