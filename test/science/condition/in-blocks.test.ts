import { describe, expect, it } from 'vitest';
import {
  type ChainPart,
  planChain,
  roundsOf,
  runChain,
  shareRows,
} from '../../../src/science/condition/chain';
import type { ChainStep } from '../../../src/science/condition/chain-step';
import {
  applyInBlocks,
  joinSlabs,
  summariseInBlocks,
} from '../../../src/science/condition/in-blocks';
import { noState, type StepState } from '../../../src/science/condition/step-plan';
import { createRandom } from '../../../src/science/numeric/random';
import { gridOf, slabOf } from './made-conditioned';

const shape = { ny: 9, nx: 10, nk: 20 };
const recorded = slabOf(
  Float64Array.from({ length: 9 * 10 * 20 }, (_, at) => {
    const pixel = Math.floor(at / 20);
    const bright = 1 + Math.exp(-(((pixel % 10) - 5) ** 2) / 4);
    return createRandom(41, at).poisson(60 * bright) + (at % 577 === 3 ? 3000 : 0);
  }),
  shape,
);
const on = { isOff: false } as const;
const chain: readonly ChainStep[] = [
  { ...on, step: 'despike', method: 'neighbour', threshold: 6, kept: [] },
  { ...on, step: 'denoise', rank: 2 },
  { ...on, step: 'align-rows', maxShiftPx: 2 },
  { ...on, step: 'baseline', method: 'snip', halfWidth: 4 },
  { ...on, step: 'bin', x: 1, y: 2, k: 1 },
];

function last<Result>(steps: Generator<number, Result>, seen: number[]): Result {
  for (let step = steps.next(); ; step = steps.next()) {
    if (step.done) return step.value;
    seen.push(step.value);
  }
}

describe.each([1, 2, 4, 100])('in blocks of %d rows', (rows) => {
  it('every step gives the bits of all rows at once, and says how far it is', () => {
    const plan = planChain(chain, gridOf(shape));
    const shared = shareRows(plan, { y0: 0, y1: 9 });
    const whole = runChain(plan, [{ rows: shared, slab: recorded }]);
    let part: ChainPart = { rows: shared, slab: recorded };
    plan.steps.forEach((step, index) => {
      const seen: number[] = [];
      let state: StepState = noState;
      for (let round = 0; round < roundsOf(step); round++) {
        const summaries = last(summariseInBlocks(plan, index, part, round, state, rows), []);
        state = step.merge(round, summaries, state);
      }
      expect(state).toEqual(whole.steps[index].state);
      const result = last(applyInBlocks(plan, index, part, state, rows), seen);
      expect(seen.at(-1)).toBe(1);
      expect(step.report(result.tally, state)).toEqual(whole.steps[index].report);
      expect(result.maps).toEqual(whole.steps[index].maps[0]);
      expect(result.spikes).toEqual(whole.steps[index].spikes[0]);
      part = { ...part, slab: result.slab };
    });
    expect(part.slab).toEqual(whole.slabs[0]);
  });
});

it('joins rows only where they follow one another', () => {
  expect(() => joinSlabs([recorded, recorded])).toThrow('do not follow row 8');
});
