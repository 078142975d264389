/** How one parameter of a component is given: a number, its start, or start, bounds, tie and unit. */
import * as z from 'zod';
import { defaults } from './default-values';
import { isRecord, type LooseRecord, numberSchema, type Objection, withRule } from './schema-parts';

const tieSchema = z
  .strictObject({
    to: z
      .string()
      .regex(/^[A-Za-z0-9_-]+\.[a-z_]+$/, {
        error: 'a parameter of another component, as "COMPONENT.PARAM"',
      })
      .describe('parameter of another component, "COMPONENT.PARAM"'),
    times: z
      .number()
      .describe(`factor of the other value; default ${defaults.tie.times}`)
      .exactOptional(),
    plus: z
      .number()
      .describe(`added to the other value, in this parameter's unit; default ${defaults.tie.plus}`)
      .exactOptional(),
  })
  .meta({
    id: 'Tie',
    description: 'holds a parameter at other × times + plus',
  });

const fixed = z
  .boolean()
  .describe('true: held at "start" instead of fitted; default false')
  .exactOptional();
const tie = tieSchema.exactOptional();

interface Domain {
  readonly least: number;
  readonly most: number;
  /** what a value must be, in words */
  readonly expected: string;
}

const anywhere: Domain = { least: -Infinity, most: Infinity, expected: 'a number' };
const fromZero: Domain = { least: 0, most: Infinity, expected: 'a number of at least 0' };
const zeroToOne: Domain = { least: 0, most: 1, expected: 'a number from 0 to 1' };

const plainForm = withRule(
  z.strictObject({
    start: numberSchema
      .describe('value the fit begins with; left out: estimated from the data')
      .exactOptional(),
    min: numberSchema.describe('least value allowed').exactOptional(),
    max: numberSchema.describe('greatest value allowed').exactOptional(),
    fixed,
    tie,
  }),
  boundsRule(anywhere),
).meta({ id: 'Parameter' });

/** A parameter without a unit of its own: counts, a share, an asymmetry. */
export function plainSpec(what: string) {
  return z
    .union([numberSchema, plainForm], {
      error: 'a number (its start), or an object with start, min, max, fixed, tie',
    })
    .describe(`${what}; a number is its start`);
}

const mixForm = withRule(
  z.strictObject({
    start: numberSchema.min(0).max(1).describe('value the fit begins with, 0 to 1').exactOptional(),
    min: numberSchema.min(0).max(1).describe('least value allowed; default 0').exactOptional(),
    max: numberSchema.min(0).max(1).describe('greatest value allowed; default 1').exactOptional(),
    fixed,
    tie,
  }),
  boundsRule(zeroToOne),
).meta({ id: 'ShareParameter' });

/** A share from 0 to 1. */
export function mixSpec(what: string) {
  return z
    .union([numberSchema.min(0).max(1), mixForm], {
      error: 'a number from 0 to 1 (its start), or an object with start, min, max, fixed, tie',
    })
    .describe(`${what}; a number is its start`);
}

const centreForm = withRule(
  z.strictObject({
    start: numberSchema
      .describe('value the fit begins with, in "unit"; left out: estimated from the data')
      .exactOptional(),
    min: numberSchema.describe('least value allowed, in "unit"').exactOptional(),
    max: numberSchema.describe('greatest value allowed, in "unit"').exactOptional(),
    fixed,
    tie,
    unit: z
      .enum(['eV', 'meV', 'nm', 'cm-1'])
      .describe(
        `eV, meV, nm (in air unless scan.axis.medium is "vacuum") or cm-1 (Raman shift, needs the laser); default "${defaults.parameter.unit}"`,
      )
      .exactOptional(),
  }),
  boundsRule(anywhere),
).meta({ id: 'CentreParameter' });

/** A place on the axis. */
export function centreSpec(what: string) {
  return z
    .union([numberSchema, centreForm], {
      error: 'a number in eV (its start), or an object with start, min, max, fixed, tie, unit',
    })
    .describe(`${what}; a number is its start in eV`);
}

const widthForm = withRule(
  z.strictObject({
    start: numberSchema
      .gt(0)
      .describe('value the fit begins with, in "unit"; left out: estimated from the data')
      .exactOptional(),
    min: numberSchema.min(0).describe('least value allowed, in "unit"').exactOptional(),
    max: numberSchema.gt(0).describe('greatest value allowed, in "unit"').exactOptional(),
    fixed,
    tie,
    unit: z
      .enum(['eV', 'meV', 'cm-1'])
      .describe(`unit of the width; default "${defaults.parameter.unit}"`)
      .exactOptional(),
  }),
  boundsRule(fromZero),
).meta({ id: 'WidthParameter' });

/** A width on the axis, above 0. */
export function widthSpec(what: string) {
  return z
    .union([numberSchema.gt(0), widthForm], {
      error:
        'a number of eV above 0 (its start), or an object with start, min, max, fixed, tie, unit',
    })
    .describe(`${what}; a number is its start in eV`);
}

/** min < max, start between them, a fixed value that is known and free of ties. */
function boundsRule(domain: Domain): (spec: LooseRecord, object: Objection) => void {
  return (spec, object) => {
    const { start, min, max } = spec;
    const least = typeof min === 'number' ? min : domain.least;
    const most = typeof max === 'number' ? max : domain.most;
    if (typeof min === 'number' && typeof max === 'number' && min >= max) {
      object(['max'], `a number above "min", ${min}`);
    } else if (typeof start === 'number' && (start < least || start > most)) {
      object(['start'], startExpected(min, max, domain));
    }
    if (spec.fixed !== true) return;
    if (isRecord(spec.tie)) object(['fixed'], 'false, since a tie gives the value');
    else if (start === undefined) object(['start'], `${domain.expected}, since it is fixed`);
  };
}

function startExpected(min: unknown, max: unknown, domain: Domain): string {
  if (typeof min === 'number' && typeof max === 'number') return `a number from ${min} to ${max}`;
  if (typeof min === 'number') return `a number of at least ${min}`;
  return typeof max === 'number' ? `a number of at most ${max}` : domain.expected;
}
