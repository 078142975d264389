/** How long a fit takes, beside other solvers of the same run, and whether they reach the same minimum. */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { plannedStart } from '../../src/science/fit/estimate-starts';
import type { CreateFitKernel } from '../../src/science/fit/fit-kernel';
import { createPlainFitKernel } from '../../src/science/fit/fit-kernel';
import { qualityAt } from '../../src/science/fit/fit-record';
import { PixelFitter } from '../../src/science/fit/pixel-fitter';
import { createFitKernel } from '../../workers/kernel/fit-kernel';
import { type FitWorkload, fitWorkloads } from './fit-workloads';
import { median, type Row, told } from './measure';

const rounds = 5;

interface OurFit {
  readonly microseconds: number;
  /** of each spectrum, beside a perfect fit */
  readonly deviances: Float64Array;
  readonly iterations: number;
}

/** Spectrum after spectrum, each from the one before, as pixels of a row are. */
function ours({ model, spectra }: FitWorkload, createKernel: CreateFitKernel): OurFit {
  const fitter = new PixelFitter(model, createKernel);
  const deviances = new Float64Array(spectra.length);
  const row = new Float64Array(fitter.layout.length);
  const devianceAt = qualityAt(fitter.layout, 'deviance');
  const iterationsAt = qualityAt(fitter.layout, 'iterations');
  const times: number[] = [];
  let iterations = 0;
  for (let round = -2; round < rounds; round++) {
    const start = performance.now();
    iterations = 0;
    let hasBefore = false;
    for (const [i, spectrum] of spectra.entries()) {
      row.set(fitter.fit(spectrum, { rows: [hasBefore ? row : null], usualChi2r: 1 }));
      hasBefore = true;
      deviances[i] = row[devianceAt];
      iterations += row[iterationsAt];
    }
    if (round >= 0) times.push((1000 * (performance.now() - start)) / spectra.length);
  }
  return { microseconds: median(times), deviances, iterations: iterations / spectra.length };
}

/** The general solver in JavaScript: weighted least squares, numeric derivatives, ten iterations; of two spectra. */
function general({ model, spectra }: FitWorkload): number {
  const start = plannedStart(model.plan);
  const { components } = model.plan;
  const counts = new Float64Array(model.grid.centresEv.length);
  const curve = (parameters: readonly number[]) => {
    counts.fill(0);
    const values = Float64Array.from(parameters);
    for (const [c, { first, count }] of components.entries()) {
      const own = values.subarray(first, first + count);
      model.shapes[c].evaluate(model.grid, own, counts, null);
    }
    return (x: number): number => counts[x];
  };
  const begun = performance.now();
  for (const spectrum of spectra.slice(0, 2)) {
    levenbergMarquardt({ x: [...spectrum.keys()], y: [...spectrum] }, (p) => curve(p), {
      initialValues: [...start].map((value, i) => (value === 0 ? (i === 0 ? 30 : 1) : value)),
      weights: [...spectrum].map((count) => 1 / Math.sqrt(Math.max(1, count))),
      maxIterations: 10,
      gradientDifference: [...start].map((value) => Math.max(1e-6, Math.abs(value) * 1e-6)),
    });
  }
  return (1000 * (performance.now() - begun)) / 2;
}

interface Peer {
  readonly name: string;
  readonly microseconds: number;
  readonly deviances: readonly number[];
}

/** What python3 has, and a C twin where there is a compiler; none where there is neither. */
function peersOf(workload: FitWorkload, index: number): readonly Peer[] {
  const folder = mkdtempSync(join(tmpdir(), 'rimlight-fit-'));
  try {
    const { model, spectra, truth } = workload;
    const path = join(folder, 'spectra.f64');
    const all = new Float64Array(spectra.length * spectra[0].length);
    for (const [i, spectrum] of spectra.entries()) all.set(spectrum, i * spectrum.length);
    writeFileSync(path, all);
    const problem = {
      edges: [...model.grid.edgesEv],
      shapes: model.plan.components.map(({ shape }) => shape),
      fixed: model.plan.parameters.map(({ isFixed }) => isFixed),
      start: [...truth],
      spectra: path,
    };
    const file = join(folder, 'problem.json');
    writeFileSync(file, JSON.stringify(problem));
    const script = fileURLToPath(new URL('../../test/bench/fit-peers.py', import.meta.url));
    for (const python of ['/usr/bin/python3', 'python3']) {
      const { status, stdout } = spawnSync(python, [script, file, String(index)], {
        encoding: 'utf8',
      });
      if (status === 0) return JSON.parse(stdout) as readonly Peer[];
    }
    return [];
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** The greatest amount by which our deviance lies above that of any peer, over the spectra both fitted. */
function worstGap(fit: OurFit, peers: readonly Peer[]): number {
  const gaps = peers.flatMap(({ deviances }) =>
    deviances.map((deviance, i) => fit.deviances[i] - deviance),
  );
  return gaps.length === 0 ? Number.NaN : Math.max(...gaps);
}

export function benchFits(): readonly Row[] {
  return fitWorkloads().flatMap((workload, index) => {
    const fast = ours(workload, createFitKernel);
    const plain = ours(workload, createPlainFitKernel);
    const slow = general(workload);
    const peers = peersOf(workload, index);
    const us = (time: number): string => `${time.toFixed(time < 100 ? 1 : 0)} µs`;
    const times = (time: number): string => `${(time / fast.microseconds).toFixed(1)} ×`;
    const rows: Row[] = [
      told(
        `${workload.name}: vectors, from the neighbour`,
        `${us(fast.microseconds)}, ${fast.iterations.toFixed(1)} iterations`,
      ),
      told('  the plain kernel', `${us(plain.microseconds)}, ${times(plain.microseconds)}`),
      told('  ml-levenberg-marquardt, ten iterations', `${us(slow)}, ${times(slow)}`),
    ];
    for (const { name, microseconds } of peers) {
      const goal = name.includes('analytic') && index === 0 ? 25 : 0;
      rows.push({
        what: `  ${name}`,
        value: `${us(microseconds)}, ${times(microseconds)}`,
        goal: goal === 0 ? '' : `at least ${goal} ×`,
        isMet: microseconds / fast.microseconds >= goal,
      });
    }
    const likelihoods = peers.filter(({ name }) => name.includes('Poisson'));
    const gap = worstGap(fast, likelihoods);
    if (!Number.isNaN(gap)) {
      rows.push({
        what: '  deviance above the best of the others, at most',
        value: gap.toExponential(1),
        goal: 'at most 1e-3',
        isMet: gap <= 1e-3,
      });
    }
    return rows;
  });
}
