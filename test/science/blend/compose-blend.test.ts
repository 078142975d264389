/** Blends against values worked by hand from the definition of sRGB. */
import { describe, expect, it } from 'vitest';
import { type BlendLayer, composeBlend } from '../../../src/science/blend/compose-blend';
import { colourScale } from '../../../src/science/colour/colour-scales';
import { parseHexColour } from '../../../src/science/colour/srgb';

const unit = { low: 0, high: 1 };

function layer(
  colour: string,
  values: readonly number[],
  more: Partial<BlendLayer> = {},
): BlendLayer {
  return {
    values: Float64Array.from(values),
    limits: unit,
    colour: parseHexColour(colour),
    gamma: 1,
    ...more,
  };
}

const pixel = (picture: Uint8ClampedArray, index: number): number[] => [
  ...picture.subarray(4 * index, 4 * index + 4),
];

describe('composeBlend', () => {
  it('shows one channel black at its low limit, in its own colour at its high limit and beyond', () => {
    const picture = composeBlend([layer('#ff5a4d', [-3, 0, 1, 9])], 'additive');
    expect(pixel(picture, 0)).toEqual([0, 0, 0, 255]);
    expect(pixel(picture, 1)).toEqual([0, 0, 0, 255]);
    expect(pixel(picture, 2)).toEqual([0xff, 0x5a, 0x4d, 255]);
    expect(pixel(picture, 3)).toEqual([0xff, 0x5a, 0x4d, 255]);
  });

  it.each(['#ff5a4d', '#3fd07a', '#4c8dff', '#ffffff'])(
    'shows one channel of %s as its ramp, to within a byte',
    (colour) => {
      const values = Array.from({ length: 256 }, (_, i) => i / 255);
      const picture = composeBlend([layer(colour, values)], 'screen');
      const { table } = colourScale(colour);
      for (let i = 0; i < 256; i++) {
        for (let part = 0; part < 3; part++) {
          expect(Math.abs(picture[4 * i + part]! - table[3 * i + part]!)).toBeLessThanOrEqual(1);
        }
      }
    },
  );

  it('adds light, not bytes', () => {
    // Red 186 is 0.4910 of full light; twice that is 0.9820, byte 253.
    // ((186/255 + 0.055)/1.055)^2.4 = 0.49102; 1.055 × 0.98204^(1/2.4) − 0.055 = 0.99207; × 255 = 252.98.
    const two = [layer('#ba0000', [1]), layer('#ba0000', [1])];
    expect(pixel(composeBlend(two, 'additive'), 0)).toEqual([253, 0, 0, 255]);
  });

  it('cuts off what is too bright when it adds', () => {
    const two = [layer('#ff8000', [1]), layer('#ff0000', [1])];
    expect(pixel(composeBlend(two, 'additive'), 0)).toEqual([255, 128, 0, 255]);
  });

  it('multiplies what is left dark when it screens', () => {
    // 1 − (1 − 0.49102)² = 0.74094; 1.055 × 0.74094^(1/2.4) − 0.055 = 0.87610; × 255 = 223.4.
    const two = [layer('#ba0000', [1]), layer('#ba0000', [1])];
    expect(pixel(composeBlend(two, 'screen'), 0)).toEqual([223, 0, 0, 255]);
  });

  it('mixes colours of different channels as light mixes', () => {
    const three = [layer('#ff0000', [1]), layer('#00ff00', [1]), layer('#0000ff', [1])];
    expect(pixel(composeBlend(three, 'additive'), 0)).toEqual([255, 255, 255, 255]);
    expect(pixel(composeBlend(three.slice(0, 2), 'screen'), 0)).toEqual([255, 255, 0, 255]);
  });

  it('darkens with gamma above 1 and lightens below', () => {
    // White at the share 0.5: light 0.5^(3 gamma), that is 0.125, 0.015625 and 0.35355 for 1, 2 and 0.5;
    // bytes 255 × (1.055 × 0.125^(1/2.4) − 0.055) = 99.1, 33.5 and 160.4.
    const red = (gamma: number) =>
      composeBlend([layer('#ffffff', [0.5], { gamma })], 'additive')[0];
    expect([red(1), red(2), red(0.5)]).toEqual([99, 34, 160]);
  });

  it('is transparent where no map has a value, and takes what there is elsewhere', () => {
    const gap = Number.NaN;
    const two = [layer('#ff0000', [gap, gap, 1]), layer('#0000ff', [gap, 1, gap])];
    const picture = composeBlend(two, 'screen');
    expect(pixel(picture, 0)).toEqual([0, 0, 0, 0]);
    expect(pixel(picture, 1)).toEqual([0, 0, 255, 255]);
    expect(pixel(picture, 2)).toEqual([255, 0, 0, 255]);
  });

  it('is a step where the limits are equal, and turned round where low lies above high', () => {
    const step = layer('#ffffff', [4, 5, 6, Number.NaN], { limits: { low: 5, high: 5 } });
    expect([...composeBlend([step], 'additive')].filter((_, i) => i % 4 === 0)).toEqual([
      0, 0, 255, 0,
    ]);
    const turned = layer('#ffffff', [0, 1], { limits: { low: 1, high: 0 } });
    expect([...composeBlend([turned], 'additive')].filter((_, i) => i % 4 === 0)).toEqual([255, 0]);
  });

  it('is transparent where the limits are unknown for want of values', () => {
    const empty = layer('#ffffff', [Number.NaN], { limits: { low: Number.NaN, high: Number.NaN } });
    expect([...composeBlend([empty], 'additive')]).toEqual([0, 0, 0, 0]);
  });
});
