/**
 * A thin layer over bumps and along a wrinkle: its height, and the stretching that this height demands.
 *
 * Bumps are bells h₀ exp(−r²/2s²). In-plane equilibrium and compatibility of a thin plate (A. Föppl 1907; T. von
 * Kármán 1910) give, with the stress vanishing far away,
 *     εxx + εyy = (1 − ν) (h₀²/4s²) exp(−r²/s²).
 * A straight ridge has no Gaussian curvature, so compatibility leaves its stretching open; here the layer is held on
 * both sides, and the extra length ½∫h′² du across the ridge is shared out in proportion to the height:
 *     ε⊥ = h₀²/(4√2 w²) exp(−u²/2w²), nothing along it.
 * Traces add; the small terms in which two features' curvatures multiply are left out.
 */
import { cos, exp, sin } from '../numeric/elementary';
import type { Random } from '../numeric/random';

export interface Bell {
  readonly xNm: number;
  readonly yNm: number;
  readonly heightNm: number;
  /** s: where the height has fallen to exp(−½) of the top's */
  readonly sigmaNm: number;
}

/** A straight ridge through a point, with a Gaussian cross-section. */
export interface Ridge {
  readonly xNm: number;
  readonly yNm: number;
  readonly angleRad: number;
  readonly heightNm: number;
  readonly sigmaNm: number;
}

export interface Relief {
  readonly bells: readonly Bell[];
  readonly ridges: readonly Ridge[];
  /** Poisson's ratio of the layer */
  readonly poissonRatio: number;
}

export interface BellLayout {
  readonly widthNm: number;
  readonly depthNm: number;
  readonly spacingNm: number;
  readonly jitterNm: number;
  /** range of s, nm */
  readonly sigmaNm: readonly [number, number];
  /** range of h₀/s */
  readonly steepness: readonly [number, number];
  /** share of sites with a bump */
  readonly occupied: number;
}

/** Bumps on a square lattice with every site a little off; the site nearest to the middle is always occupied and comes first. */
export function placeBells(random: Random, layout: BellLayout): Bell[] {
  const { widthNm, depthNm, spacingNm, jitterNm, occupied } = layout;
  const columns = Math.max(1, Math.round(widthNm / spacingNm));
  const rows = Math.max(1, Math.round(depthNm / spacingNm));
  const between = ([low, high]: readonly [number, number]) => low + (high - low) * random.uniform();
  const middle = Math.floor(rows / 2) * columns + Math.floor(columns / 2);
  const bells: Bell[] = [];
  for (let site = 0; site < rows * columns; site++) {
    const xNm = ((site % columns) + 0.5) * (widthNm / columns) + between([-jitterNm, jitterNm]);
    const yNm =
      (Math.floor(site / columns) + 0.5) * (depthNm / rows) + between([-jitterNm, jitterNm]);
    const sigmaNm = between(layout.sigmaNm);
    const bell = { xNm, yNm, sigmaNm, heightNm: sigmaNm * between(layout.steepness) };
    const isOccupied = random.uniform() < occupied;
    if (site === middle) bells.unshift(bell);
    else if (isOccupied) bells.push(bell);
  }
  return bells;
}

/** Squared distance from a bump's centre, nm². */
export function squaredDistance(bell: Bell, xNm: number, yNm: number): number {
  const dx = xNm - bell.xNm;
  const dy = yNm - bell.yNm;
  return dx * dx + dy * dy;
}

/** exp(−u²/2w²) at distance u from a ridge's line: 1 on it, 0 far away. */
export function ridgeProfile(ridge: Ridge, xNm: number, yNm: number): number {
  const u = (yNm - ridge.yNm) * cos(ridge.angleRad) - (xNm - ridge.xNm) * sin(ridge.angleRad);
  return exp((-0.5 * u * u) / (ridge.sigmaNm * ridge.sigmaNm));
}

/** Height of the layer over the flat ground, nm. */
export function reliefHeightNm(relief: Relief, xNm: number, yNm: number): number {
  let height = 0;
  for (const bell of relief.bells) {
    const s2 = bell.sigmaNm * bell.sigmaNm;
    height += bell.heightNm * exp((-0.5 * squaredDistance(bell, xNm, yNm)) / s2);
  }
  for (const ridge of relief.ridges) height += ridge.heightNm * ridgeProfile(ridge, xNm, yNm);
  return height;
}

/** εxx + εyy, percent, tensile positive. */
export function strainTracePercent(relief: Relief, xNm: number, yNm: number): number {
  let trace = 0;
  for (const bell of relief.bells) {
    const s2 = bell.sigmaNm * bell.sigmaNm;
    const steepness2 = (bell.heightNm * bell.heightNm) / s2;
    const r2 = squaredDistance(bell, xNm, yNm);
    trace += (1 - relief.poissonRatio) * (steepness2 / 4) * exp(-r2 / s2);
  }
  for (const ridge of relief.ridges) {
    const steepness = ridge.heightNm / ridge.sigmaNm;
    trace += ((steepness * steepness) / (4 * Math.SQRT2)) * ridgeProfile(ridge, xNm, yNm);
  }
  return 100 * trace;
}
