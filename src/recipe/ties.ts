/** Ties between parameters: each leads to a parameter that exists, and none back to itself. */
import { nearestWord } from './nearest';
import { type RecipeProblem, wrongValue } from './problems';
import { isRecord } from './schema-parts';
import { shapeParameters } from './shape-parameters';

interface Tie {
  readonly path: readonly (string | number)[];
  /** "COMPONENT.PARAM" that is tied */
  readonly from: string;
  readonly to: string;
}

/**
 * @param components - the model's components, possibly invalid in other ways
 */
export function tieProblems(components: readonly unknown[]): readonly RecipeProblem[] {
  const ties = components.flatMap(tiesOf);
  const targets = components.flatMap(targetsOf);
  const vague = new Set(components.flatMap(vagueNames));
  const next = new Map(ties.map(({ from, to }) => [from, to]));
  return ties.flatMap(({ path, from, to }) => {
    const component = to.split('.')[0] ?? '';
    if (!targets.includes(to) && !vague.has(component)) {
      const expected =
        targets.length === 0
          ? 'a parameter of another component'
          : 'a parameter of a component of the model, as "COMPONENT.PARAM"';
      return [wrongValue({ path, value: to, expected, nearest: nearestWord(to, targets) })];
    }
    if (!leadsBack(from, next)) return [];
    return [
      wrongValue({ path, value: to, expected: 'a parameter that does not lead back to this one' }),
    ];
  });
}

function tiesOf(component: unknown, index: number): readonly Tie[] {
  if (!isRecord(component) || typeof component.name !== 'string') return [];
  const { name } = component;
  return Object.entries(component).flatMap(([parameter, spec]) => {
    if (!isRecord(spec) || !isRecord(spec.tie) || typeof spec.tie.to !== 'string') return [];
    const path = ['model', 'components', index, parameter, 'tie', 'to'];
    return [{ path, from: `${name}.${parameter}`, to: spec.tie.to }];
  });
}

function targetsOf(component: unknown): readonly string[] {
  if (!isRecord(component) || typeof component.name !== 'string') return [];
  const { name, shape } = component;
  return shapeParameters(shape).map((parameter) => `${name}.${parameter}`);
}

function vagueNames(component: unknown): readonly string[] {
  if (!isRecord(component) || typeof component.name !== 'string') return [];
  return shapeParameters(component.shape).length === 0 ? [component.name] : [];
}

/** Follows the ties from one parameter, at most as many as there are. */
function leadsBack(from: string, next: ReadonlyMap<string, string>): boolean {
  let at = next.get(from);
  for (let steps = 0; at !== undefined && steps <= next.size; steps++) {
    if (at === from) return true;
    at = next.get(at);
  }
  return false;
}
