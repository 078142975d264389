/** Despiking in a chain. */

import type { StepOf } from './chain-step';
import { type ConditionedSlab, type Grid, rowsOf } from './conditioned';
import { assertThreshold, type Despiked, type SpikeList } from './despike';
import { despikeNeighbour } from './despike-neighbour';
import { despikeSpectral } from './despike-spectral';
import { counted, planOf, rowCounts } from './plan-base';
import { type StepPlace, stepError } from './step-errors';
import type { PlannedStep, RowSpan, RowTally, StepReport, StepResult, Tally } from './step-plan';

/** @throws RimlightError 'recipe' - for a threshold that is none, and neighbours in a scan of one pixel */
export function planDespike(step: StepOf<'despike'>, grid: Grid, place: StepPlace): PlannedStep {
  assertThreshold(step.threshold, place);
  const { ny, nx } = grid.shape;
  const report = (tally: Tally): StepReport => reportOf(place, tally, grid);
  if (step.method === 'spectral') {
    return planOf(place, grid, {
      apply: (slab, rows) => resultOf(despikeSpectral(rowsOf(slab, rows.y0, rows.y1), step)),
      report,
    });
  }
  if (ny * nx === 1) {
    throw stepError(
      place,
      'a scan of one pixel has no neighbours to compare with',
      'Choose the method "spectral".',
    );
  }
  return planOf(place, grid, {
    reach: { kind: 'rows', halo: 1 },
    rowsFor: ({ y0, y1 }) =>
      y1 <= y0 ? { y0, y1 } : { y0: Math.max(0, y0 - 1), y1: Math.min(ny, y1 + 1) },
    apply: (slab, rows) => resultOf(despikeNeighbour(nearRows(slab, rows, ny), step, rows)),
    report,
  });
}

/** No more than a row on either side: a result must not depend on how many were at hand. */
function nearRows(slab: ConditionedSlab, { y0, y1 }: RowSpan, ny: number): ConditionedSlab {
  return y1 <= y0 ? rowsOf(slab, y0, y0) : rowsOf(slab, Math.max(0, y0 - 1), Math.min(ny, y1 + 1));
}

function resultOf({ slab, spikes, countMap }: Despiked): StepResult {
  const { nx } = slab.shape;
  return {
    slab,
    tally: {
      ...channelsByRow(spikes, slab),
      spikes: spikesByRow(spikes, slab),
      channels: rowCounts(countMap, nx, (count) => count),
      pixels: rowCounts(countMap, nx, (count) => (count > 0 ? 1 : 0)),
    },
    maps: [{ name: 'despike.count', unit: '', values: countMap }],
    spikes,
  };
}

/** Channels in a row are one spike. */
function spikesByRow({ y, x, k }: SpikeList, slab: ConditionedSlab): Float64Array {
  const rows = new Float64Array(slab.shape.ny);
  for (let i = 0; i < k.length; i++) {
    const goesOn = i > 0 && k[i] === k[i - 1] + 1 && x[i] === x[i - 1] && y[i] === y[i - 1];
    if (!goesOn) rows[y[i] - slab.y0]++;
  }
  return rows;
}

const channelKey = 'channel ';

/** How often each channel was replaced, under "channel 208", for those that were. */
function channelsByRow({ y, k }: SpikeList, slab: ConditionedSlab): RowTally {
  const tally: Record<string, Float64Array> = {};
  for (let i = 0; i < k.length; i++) {
    tally[`${channelKey}${k[i]}`] ??= new Float64Array(slab.shape.ny);
    tally[`${channelKey}${k[i]}`][y[i] - slab.y0]++;
  }
  return tally;
}

/** A channel hit in more than this share of the pixels was not hit: a line of the sample is there. */
const mostOfChannel = 0.02;

function lineWarnings(tally: Tally, { axis, shape }: Grid): readonly string[] {
  const pixels = shape.ny * shape.nx;
  let worst = { channel: -1, count: Math.max(5, mostOfChannel * pixels) };
  for (const [name, count] of Object.entries(tally)) {
    if (!name.startsWith(channelKey) || count <= worst.count) continue;
    worst = { channel: Number(name.slice(channelKey.length)), count };
  }
  if (worst.channel < 0) return [];
  return [
    `At ${axis.centresEv[worst.channel].toFixed(4)} eV ${worst.count} of ${pixels} px were replaced: that is a narrow line of the sample, not cosmic rays. Compare with the neighbours instead.`,
  ];
}

/** Cosmic rays light far less; more than this is the sample's, or a threshold too low. */
const mostShare = 0.01;

function reportOf(place: StepPlace, tally: Tally, grid: Grid): StepReport {
  const { spikes, pixels, channels } = tally;
  const values = grid.shape.ny * grid.shape.nx * grid.shape.nk;
  const isMuch = channels > mostShare * values;
  return {
    place,
    line: spikes === 0 ? 'no spikes' : `${counted(spikes, 'spike')} in ${pixels} px`,
    warnings: isMuch
      ? [
          ...lineWarnings(tally, grid),
          `${((100 * channels) / values).toFixed(1)} % of all channels were replaced, more than cosmic rays hit: raise the threshold, or compare with the neighbours.`,
        ]
      : lineWarnings(tally, grid),
  };
}
