/** What surrounds the spectra: pixel pitch, height map, the way rows ran, exposure. */

import { findExposure, findSerpentine } from './exposure';
import { attempt, type Evidence, type Findings, note } from './findings';
import { type FoundHeight, findHeight } from './height';
import type { Layout } from './layout';
import { findPixel } from './pixel';
import type { FoundPixel } from './pixel-question';
import type { Vector } from './vectors';

export interface Setting {
  readonly pixel: FoundPixel;
  readonly height: FoundHeight;
  readonly isSerpentine: boolean;
  readonly exposureS: number | null;
}

/**
 * Null, with the reasons among the problems, when something stated cannot be.
 *
 * @param axis - the vector taken for the spectral axis, which is no position
 */
export function findSetting(
  evidence: Evidence,
  findings: Findings,
  layout: Layout,
  axis: Vector | null,
): Setting | null {
  const { choices, sayings } = evidence;
  const pixel = attempt(findings, () => pixelOf(evidence, layout, axis));
  if (pixel !== null) {
    note(findings, pixel.guess);
    // Readers that lay scattered points side by side have said so already.
    const isSaid = evidence.container.notes.some((one) => one.includes('scattered'));
    findings.warnings.push(...(isSaid ? [] : pixel.warnings));
  }
  const height = attempt(findings, () => heightOf(evidence, layout));
  if (height !== null) {
    note(findings, height.guess);
    findings.warnings.push(...height.warnings);
  }
  const { isSerpentine, guess } = findSerpentine(choices.serpentine, sayings, layout.ny);
  note(findings, guess);
  const exposure = attempt(findings, () => findExposure(choices.exposure_s, sayings));
  if (exposure !== null) note(findings, exposure.guess);
  if (pixel === null || height === null || exposure === null) return null;
  return { pixel, height, isSerpentine, exposureS: exposure.exposureS };
}

function pixelOf(evidence: Evidence, layout: Layout, axis: Vector | null): FoundPixel {
  const { choices, vectors, sayings } = evidence;
  const { ny, nx, cube, nameOf } = layout;
  return findPixel({
    ny,
    nx,
    stated: choices.pixel,
    vectors: vectors.filter(({ vector }) => vector.entry !== axis?.entry),
    xName: nameOf('x'),
    yName: nameOf('y'),
    sayings,
    cubePath: cube.entry.path,
  });
}

function heightOf(evidence: Evidence, { ny, nx, cube, order }: Layout): FoundHeight {
  const { container, companions, choices, fileName } = evidence;
  return findHeight({
    ny,
    nx,
    container,
    companions,
    fileName,
    stated: choices.height,
    cubePath: cube.entry.path,
    isColumnsFirst: /x.*y/.test(order.order),
  });
}
