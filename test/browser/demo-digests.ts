/** Digests of what must have the same bits in every engine; run in Node and in the page. */
import { generateScenario } from '../../src/science/scenarios/scenario';
import { elementaryBitsDigest } from '../science/numeric/elementary-bits';
import { shapeBitsDigest } from '../science/peaks/shape-bits';
import { digestOfSample } from '../science/scenarios/digest';

export interface DemoDigests {
  readonly elementary: string;
  readonly shapes: string;
  readonly tentField: string;
  readonly twinLayer: string;
}

const small = { seed: 3, ny: 12, nx: 14, nk: 256 };

export function demoDigests(): DemoDigests {
  return {
    elementary: elementaryBitsDigest(),
    shapes: shapeBitsDigest(),
    tentField: digestOfSample(generateScenario('tent-field', small)),
    twinLayer: digestOfSample(generateScenario('twin-layer', small)),
  };
}
