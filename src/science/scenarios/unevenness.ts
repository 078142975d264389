/** The slow unevenness of a real layer: what makes two flat places differ. */
import { cos, sin } from '../numeric/elementary';
import type { Random } from '../numeric/random';

export type Landscape = (xNm: number, yNm: number) => number;

/**
 * A smooth random landscape of mean 0 and variance 1: twelve plane waves of equal strength, directions and phases at
 * random.
 *
 * @param wavelengthsNm - shortest and longest wave
 */
export function makeLandscape(
  random: Random,
  [shortest, longest]: readonly [number, number],
): Landscape {
  const waves = Array.from({ length: 12 }, () => {
    const angle = 2 * Math.PI * random.uniform();
    const perNm = (2 * Math.PI) / (shortest + (longest - shortest) * random.uniform());
    const phase = 2 * Math.PI * random.uniform();
    return { x: perNm * cos(angle), y: perNm * sin(angle), phase };
  });
  // a cosine of random phase has variance ½
  const scale = Math.sqrt(2 / waves.length);
  return (xNm, yNm) => {
    let sum = 0;
    for (const wave of waves) sum += cos(wave.x * xNm + wave.y * yNm + wave.phase);
    return scale * sum;
  };
}
