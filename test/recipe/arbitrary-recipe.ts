/** Valid recipes of every kind, for property tests. */
import fc from 'fast-check';
import {
  bin,
  block,
  colour,
  file,
  finite,
  index,
  interval,
  positive,
  word,
} from './arbitrary-parts';
import { step } from './arbitrary-step';

function names(most: number): fc.Arbitrary<string[]> {
  return fc.uniqueArray(fc.stringMatching(/^[A-Za-z0-9_-]{1,8}$/), {
    maxLength: most,
    comparator: (a, b) => a.toLowerCase() === b.toLowerCase(),
  });
}

const axis = fc.oneof(
  block({
    kind: fc.constant('wavelength'),
    data: fc.constant('/entry/wavelength'),
    unit: fc.constantFrom('nm', 'um', 'angstrom'),
    medium: fc.constantFrom('air', 'vacuum'),
  }),
  block({ kind: fc.constant('energy'), file, unit: fc.constantFrom('eV', 'meV', 'cm-1') }, [
    'kind',
  ]),
  interval(finite).map(([from, to]) => ({ kind: 'shift', from, to, unit: 'cm-1' })),
  fc.array(finite, { minLength: 2, maxLength: 60 }).map((values) => ({ values })),
);

const scan = block({
  data: fc.constant('/entry/counts'),
  order: fc.constantFrom('yxk', 'kyx', 'xk', 'k'),
  axis,
  pixel: fc.record({ x: positive, y: positive, unit: fc.constantFrom('nm', 'um', 'V') }),
  laser: fc.record({ value: positive, unit: fc.constantFrom('nm', 'eV', 'cm-1') }),
  serpentine: fc.boolean(),
  exposure_s: positive,
  detector: block({
    electrons_per_count: positive,
    offset_counts: finite,
    read_noise_e: positive,
    excess_noise: fc.double({ min: 1, max: 2, noNaN: true }),
  }),
  height: block({ file, unit: fc.constantFrom('nm', 'um'), shift_px: fc.tuple(finite, finite) }),
});

function band(name: string): fc.Arbitrary<Record<string, unknown>> {
  return interval(positive).chain(([from, to]) =>
    block(
      {
        name: fc.constant(name),
        from: fc.constant(from),
        to: fc.constant(to),
        unit: fc.constantFrom('eV', 'meV', 'nm', 'cm-1'),
        floor: fc.constantFrom('none', 'ends'),
      },
      ['name', 'from', 'to', 'unit'],
    ),
  );
}

const bounds = fc
  .uniqueArray(positive, { minLength: 3, maxLength: 3 })
  .map((values) => values.sort((a, b) => a - b))
  .chain(([min, start, max]) =>
    block(
      {
        start: fc.constant(start),
        min: fc.constant(min),
        max: fc.constant(max),
        fixed: fc.boolean(),
      },
      ['start'],
    ),
  );

const parameter = fc.oneof(positive, bounds);

function component(name: string): fc.Arbitrary<Record<string, unknown>> {
  const common = {
    name: fc.constant(name),
    role: fc.constantFrom('exciton', 'trion', 'localised', 'interlayer', 'raman'),
    optional: fc.boolean(),
  };
  const peak = { ...common, area: parameter, centre: parameter, fwhm: parameter };
  const needed = ['name', 'shape'];
  return fc.oneof(
    block({ ...peak, shape: fc.constantFrom('gaussian', 'lorentzian') }, needed),
    block(
      { ...peak, shape: word('pseudo-voigt'), eta: fc.double({ min: 0, max: 1, noNaN: true }) },
      needed,
    ),
    block(
      { ...common, shape: word('voigt'), centre: parameter, fwhm_g: parameter, fwhm_l: parameter },
      needed,
    ),
    block({ ...peak, shape: word('tailed'), tail: parameter }, needed),
    block({ ...peak, shape: word('fano'), q: finite }, needed),
    block({ ...common, shape: word('flat'), level: finite }, needed),
    block(
      { ...common, shape: word('parabola'), level: finite, slope: finite, curvature: finite },
      needed,
    ),
    block({ ...common, shape: word('decay'), level: finite, decay: finite }, needed),
  );
}

function region(name: string): fc.Arbitrary<Record<string, unknown>> {
  const common = { name: fc.constant(name) };
  const pair = fc.tuple(index, index);
  return fc.oneof(
    fc.record({ ...common, shape: word('rectangle'), x: pair, y: pair }, { noNullPrototype: true }),
    block(
      {
        ...common,
        shape: word('ellipse'),
        x: finite,
        y: finite,
        rx: positive,
        ry: positive,
        angle: finite,
      },
      ['name', 'shape', 'x', 'y', 'rx', 'ry'],
    ),
    fc.record(
      { ...common, shape: word('polygon'), points: fc.array(pair, { minLength: 3, maxLength: 8 }) },
      { noNullPrototype: true },
    ),
    fc.record({ ...common, shape: word('mask'), file }, { noNullPrototype: true }),
    fc
      .nat({ max: 12 })
      .map((inside) => ({ name, shape: 'mask', nx: 4, ny: 3, rle: [12 - inside, inside] })),
  );
}

const limits = fc.constantFrom([0, 10], ['p1', 'p99.5'], [-3.5, 'p100'], ['p0', 7]);

function channel(source: string): fc.Arbitrary<Record<string, unknown>> {
  return limits.chain(([low, high]) =>
    block(
      {
        source: fc.constant(source),
        colour,
        low: fc.constant(low),
        high: fc.constant(high),
        gamma: positive,
      },
      ['source', 'colour', 'low', 'high'],
    ),
  );
}

const pins = fc
  .uniqueArray(fc.stringMatching(/^[A-Z]{1,2}$/), { maxLength: 5 })
  .chain((letters) =>
    fc.tuple(
      ...letters.map((name) =>
        block(
          { name: fc.constant(name), x: index, y: index, label: fc.string({ maxLength: 20 }) },
          ['name', 'x', 'y'],
        ),
      ),
    ),
  );

interface Names {
  readonly bands: readonly string[];
  readonly components: readonly string[];
  readonly regions: readonly string[];
}

function sourcesOf({ bands, components }: Names): string[] {
  return [
    'scan.total',
    'scan.height',
    ...bands.flatMap((name) => [`band.${name}.integral`, `band.${name}.centroid.err`]),
    ...(components.length === 0 ? [] : ['fit.chi2r', 'fit.status']),
  ];
}

/** Valid recipes as plain values: names unique, references that hold. */
export const arbitraryRecipe: fc.Arbitrary<Record<string, unknown>> = fc
  .record({ bands: names(4), components: names(4), regions: names(3) })
  .chain((known) => {
    const energies = known.bands.map((name) => `band.${name}.centroid`);
    const sources = sourcesOf(known);
    const unstrained = fc.constantFrom(
      { eV: 2.01 },
      ...known.regions.map((name) => ({ region: name })),
    );
    const pl =
      energies.length === 0
        ? {}
        : {
            pl: block(
              {
                source: fc.constantFrom(...energies),
                unstrained,
                gauge_meV_per_percent: positive,
                gauge_err: positive,
              },
              ['source', 'unstrained', 'gauge_meV_per_percent'],
            ),
          };
    const strain = block({
      ...pl,
      height: block({ poisson: fc.constant(0.22), edges: fc.constantFrom('held', 'relaxed') }, [
        'poisson',
      ]),
    });
    return block(
      {
        recipe: fc.constant(1),
        title: fc.string({ maxLength: 40, unit: 'grapheme' }),
        scan,
        condition: fc.array(step, { maxLength: 4 }),
        bands: fc.tuple(...known.bands.map(band)),
        ...(known.components.length === 0
          ? {}
          : {
              model: block(
                {
                  window: interval(positive),
                  noise: fc.constantFrom('poisson', 'gaussian', 'uniform'),
                  seed: fc.constantFrom('neighbour', 'start'),
                  components: fc.tuple(...known.components.map(component)),
                },
                ['components'],
              ),
            }),
        blend: fc.record(
          {
            mode: fc.constantFrom('additive', 'screen'),
            channels: fc.array(fc.constantFrom(...sources).chain(channel), {
              minLength: 1,
              maxLength: 6,
            }),
          },
          { noNullPrototype: true },
        ),
        pins,
        regions: fc.tuple(...known.regions.map(region)),
        strain,
        features: block(
          {
            source: fc.constantFrom(...sources),
            threshold: fc.oneof(finite, word('otsu')),
            min_area_px: bin,
            split: fc.boolean(),
          },
          ['source'],
        ),
      },
      ['recipe', 'bands', 'regions', ...(known.components.length === 0 ? [] : ['model'])],
    );
  });
