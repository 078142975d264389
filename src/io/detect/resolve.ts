/** Everything settled, written out as a complete `scan` block. */
import type { ScanChoices } from '../scan-choices';
import type { FoundCube } from './cube';
import type { FoundOrder } from './order';
import type { Setting } from './setting';
import type { Spectral } from './spectral';

export interface Settled {
  readonly cube: FoundCube;
  readonly order: FoundOrder;
  readonly spectral: Spectral;
  readonly setting: Setting;
}

/** Replaying it guesses nothing. What has no field there (a gate voltage along x) the file says itself. */
export function resolvedChoices(choices: ScanChoices, settled: Settled): ScanChoices {
  const { cube, order, spectral, setting } = settled;
  const { pixel, height, isSerpentine, exposureS } = setting;
  return {
    ...(cube.entry.path === '' ? {} : { data: cube.entry.path }),
    order: order.order,
    axis: spectral.axisChoice,
    ...(pixel.choice === undefined ? {} : { pixel: pixel.choice }),
    ...(spectral.laser === null ? {} : { laser: spectral.laser.line }),
    serpentine: isSerpentine,
    ...(exposureS === null ? {} : { exposure_s: exposureS }),
    ...(choices.detector === undefined ? {} : { detector: choices.detector }),
    ...(height.choice === undefined ? {} : { height: height.choice }),
  };
}
