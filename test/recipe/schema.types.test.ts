/** What the compiler must agree to; checked by `tsc`, the run only counts it. */
import { describe, expectTypeOf, it } from 'vitest';
import type { ScanChoices } from '../../src/io/scan-choices';
import type {
  BlendLimit,
  ConditionStep,
  ModelComponent,
  ParameterSpec,
  Pin,
  Recipe,
  RecipeBand,
  Region,
  ScanBlock,
} from '../../src/recipe/schema';
import type { BandFloor } from '../../src/science/bands/band';

describe('types of the recipe', () => {
  it('a scan block can be handed to the readers as it is', () => {
    expectTypeOf<ScanBlock>().toExtend<ScanChoices>();
  });

  it('every block but the format may be left out', () => {
    expectTypeOf<{ readonly recipe: 1 }>().toExtend<Recipe>();
  });

  it('a band has its four fields and perhaps a floor', () => {
    expectTypeOf<RecipeBand>().toEqualTypeOf<{
      readonly name: string;
      readonly from: number;
      readonly to: number;
      readonly unit: 'eV' | 'meV' | 'nm' | 'cm-1';
      readonly floor?: BandFloor;
    }>();
  });

  it('a pin is a named pixel', () => {
    expectTypeOf<Pin>().toEqualTypeOf<{
      readonly name: string;
      readonly x: number;
      readonly y: number;
      readonly label?: string;
    }>();
  });

  it('steps, shapes and regions are told apart by their word', () => {
    expectTypeOf<Extract<ConditionStep, { step: 'response' }>['file']>().toEqualTypeOf<string>();
    expectTypeOf<Extract<ConditionStep, { method: 'asls' }>['step']>().toEqualTypeOf<'baseline'>();
    expectTypeOf<Extract<ModelComponent, { shape: 'fano' }>>().toHaveProperty('q');
    expectTypeOf<Extract<Region, { shape: 'polygon' }>['points']>().toEqualTypeOf<
      readonly (readonly [number, number])[]
    >();
  });

  it('a limit is a number or a percentile, a parameter a number or its settings', () => {
    expectTypeOf<BlendLimit>().toEqualTypeOf<number | `p${number}`>();
    expectTypeOf<number>().toExtend<ParameterSpec>();
    expectTypeOf<{ start: number; min: number; unit: 'meV' }>().toExtend<ParameterSpec>();
  });

  it('nothing in a recipe can be written to', () => {
    expectTypeOf<Recipe>().toEqualTypeOf<Readonly<Recipe>>();
    expectTypeOf<NonNullable<Recipe['bands']>>().toEqualTypeOf<readonly RecipeBand[]>();
    expectTypeOf<RecipeBand>().toEqualTypeOf<Readonly<RecipeBand>>();
  });
});
