/** A plan for a cube in memory, as detection would make it: for the tests of loading. */
import type { ScanPlan } from '../../src/io/scan-plan';
import { channelEdges } from '../../src/science/axis';
import type { PositionAxis, ScanShape } from '../../src/science/scan';

export interface PlanParts {
  readonly shape: ScanShape;
  readonly order: string;
  /** file channel of each channel; file order when left out */
  readonly channels?: readonly number[];
  /** channels in the file; nk when left out */
  readonly fileChannels?: number;
  readonly serpentine?: boolean;
  readonly path?: string;
}

export function makePlan(parts: PlanParts): ScanPlan {
  const { shape, order } = parts;
  const lengths = { y: shape.ny, x: shape.nx, k: parts.fileChannels ?? shape.nk };
  const axis = (label: string): PositionAxis => ({
    label,
    unit: 'px',
    isLength: false,
    pitch: 1,
    values: null,
  });
  const centresEv = Float64Array.from({ length: shape.nk }, (_, k) => 1 + k / 100);
  return {
    meta: {
      name: 'fake',
      shape,
      axis: {
        centresEv,
        edgesEv: shape.nk < 2 ? Float64Array.of(0.9, 1.1) : channelEdges(centresEv),
      },
      x: axis('x'),
      y: axis('y'),
      laserEv: null,
      exposureS: null,
      noise: { kind: 'poisson' },
      quantity: 'counts',
    },
    cube: {
      path: parts.path ?? '/counts',
      fileShape: [...order].map((letter) => lengths[letter as 'y' | 'x' | 'k']),
      yAxis: order.indexOf('y'),
      xAxis: order.indexOf('x'),
      kAxis: order.indexOf('k'),
      channels: Int32Array.from(parts.channels ?? Array.from({ length: shape.nk }, (_, k) => k)),
      serpentine: parts.serpentine ?? false,
    },
    height: null,
    resolved: {},
  };
}
