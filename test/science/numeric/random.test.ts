import { describe, expect, it } from 'vitest';
import { logPoissonProbability } from '../../../src/science/numeric/poisson';
import { createRandom } from '../../../src/science/numeric/random';

const take = (count: number, draw: () => number) => Array.from({ length: count }, draw);

function moments(values: readonly number[]) {
  const n = values.length;
  const mean = values.reduce((sum, v) => sum + v, 0) / n;
  const central = (power: number) => values.reduce((sum, v) => sum + (v - mean) ** power, 0) / n;
  const variance = central(2);
  return {
    mean,
    variance,
    skew: central(3) / variance ** 1.5,
    kurtosis: central(4) / variance ** 2,
  };
}

describe('streams', () => {
  it('repeats itself for one seed and stream', () => {
    const [a, b] = [createRandom(7, 3), createRandom(7, 3)];
    expect(take(50, () => a.uint32())).toEqual(take(50, () => b.uint32()));
  });

  it('keeps the numbers that saved scans were made with', () => {
    const random = createRandom(594, 12);
    expect(take(4, () => random.uint32())).toEqual([864875602, 1225815271, 2315828476, 2282074684]);
    expect(random.normal()).toBe(-0.9528235700963387);
    expect(take(6, () => random.poisson(4))).toEqual([3, 2, 5, 4, 4, 3]);
    expect(take(6, () => random.poisson(1234.5))).toEqual([1261, 1240, 1247, 1220, 1168, 1213]);
  });

  it('differs between neighbouring seeds and streams', () => {
    const first = new Set<number>();
    for (let seed = 0; seed < 40; seed++) {
      for (let stream = 0; stream < 40; stream++) first.add(createRandom(seed, stream).uint32());
    }
    expect(first.size).toBe(1600);
  });

  it('tells seeds apart beyond 32 bits', () => {
    expect(createRandom(1).uint32()).not.toBe(createRandom(1 + 2 ** 32).uint32());
    expect(createRandom(1, 0).uint32()).not.toBe(createRandom(0, 1).uint32());
  });

  it('shows no correlation between the streams of neighbouring pixels', () => {
    const rows = take(200, () => 0).map((_, stream) => {
      const random = createRandom(1, stream);
      return take(500, () => random.uniform() - 0.5);
    });
    let sum = 0;
    for (let i = 1; i < 200; i++)
      rows[i]!.forEach((v, k) => {
        sum += v * rows[i - 1]![k]!;
      });
    // each product has standard deviation 1/12
    expect(Math.abs(sum)).toBeLessThan((4 * Math.sqrt(199 * 500)) / 12);
  });
});

describe('uniform', () => {
  it('fills [0, 1) evenly', () => {
    const random = createRandom(11);
    const bins = new Array<number>(100).fill(0);
    for (let i = 0; i < 200_000; i++) bins[Math.floor(random.uniform() * 100)]!++;
    const chi2 = bins.reduce((sum, n) => sum + (n - 2000) ** 2 / 2000, 0);
    // chi-square with 99 degrees of freedom: 0.01 % lie above 161, 0.01 % below 54
    expect(chi2).toBeLessThan(161);
    expect(chi2).toBeGreaterThan(54);
  });
});

describe('normal', () => {
  it('has the moments of a normal distribution', () => {
    const random = createRandom(5);
    const n = 200_000;
    const { mean, variance, skew, kurtosis } = moments(take(n, () => random.normal()));
    // four standard errors: 1/√n, √(2/n), √(6/n), √(24/n)
    expect(Math.abs(mean)).toBeLessThan(4 / Math.sqrt(n));
    expect(Math.abs(variance - 1)).toBeLessThan(4 * Math.sqrt(2 / n));
    expect(Math.abs(skew)).toBeLessThan(4 * Math.sqrt(6 / n));
    expect(Math.abs(kurtosis - 3)).toBeLessThan(4 * Math.sqrt(24 / n));
  });

  it('reaches into the tails as often as it should', () => {
    const random = createRandom(6);
    const beyond = take(400_000, () => random.normal()).filter((v) => Math.abs(v) > 3).length;
    // 0.2700 % lie beyond three standard deviations
    expect(Math.abs(beyond - 1080)).toBeLessThan(4 * Math.sqrt(1080));
  });
});

describe('poisson', () => {
  it.each([0.02, 0.7, 3, 9.99, 10, 17.3, 60, 400, 25_000])(
    'follows its probabilities at mean %d',
    (mean) => {
      const random = createRandom(2, Math.round(mean * 100));
      const n = 100_000;
      const seen = new Map<number, number>();
      for (let i = 0; i < n; i++) {
        const k = random.poisson(mean);
        seen.set(k, (seen.get(k) ?? 0) + 1);
      }
      const { chi2, freedom } = chiSquare(seen, mean, n);
      // Wilson and Hilferty (1931): the cube root of chi2/freedom is close to normal
      const z =
        (Math.cbrt(chi2 / freedom) - (1 - 2 / (9 * freedom))) / Math.sqrt(2 / (9 * freedom));
      expect(Math.abs(z)).toBeLessThan(4);
    },
  );

  it('keeps mean and variance equal at means no table reaches', () => {
    const random = createRandom(3);
    const { mean, variance } = moments(take(100_000, () => random.poisson(3e9)));
    expect(Math.abs(mean - 3e9)).toBeLessThan(4 * Math.sqrt(3e9 / 100_000));
    expect(Math.abs(variance / 3e9 - 1)).toBeLessThan(4 * Math.sqrt(2 / 100_000));
  });

  it('counts nothing where nothing is expected', () => {
    const random = createRandom(1);
    expect([random.poisson(0), random.poisson(-3), random.poisson(NaN)]).toEqual([0, 0, NaN]);
  });
});

/** Pearson's chi-square over bins of at least ten expected counts. */
function chiSquare(seen: ReadonlyMap<number, number>, mean: number, n: number) {
  const reach = Math.ceil(8 * Math.sqrt(mean) + 12);
  let chi2 = 0;
  let bins = 0;
  let [expected, counted] = [0, 0];
  for (let k = Math.max(0, Math.floor(mean) - reach); k <= mean + reach; k++) {
    expected += n * Math.exp(logPoissonProbability(k, mean));
    counted += seen.get(k) ?? 0;
    if (expected < 10) continue;
    chi2 += (counted - expected) ** 2 / expected;
    bins++;
    [expected, counted] = [0, 0];
  }
  return { chi2, freedom: bins - 1 };
}
