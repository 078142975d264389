/** Which array is the cube and how its axes lie. */
import type { ArrayEntry } from '../container';
import { statedAxisLength } from './axis-source';
import { entryLabel, type FoundCube, findCube } from './cube';
import { attempt, type Evidence, type Findings, note } from './findings';
import { heightEntries } from './height';
import { findNexusSignal } from './nexus';
import { type FoundOrder, findOrder } from './order';

export interface Layout {
  readonly cube: FoundCube;
  readonly order: FoundOrder;
  readonly ny: number;
  readonly nx: number;
  /** what the file calls the axis of this letter; null where it does not say */
  readonly nameOf: (letter: 'y' | 'x' | 'k') => string | null;
}

/** Null, with the reason among the problems, when there is no cube or no way to read it. */
export function findLayout(evidence: Evidence, findings: Findings): Layout | null {
  const { container, choices, fileName, vectors } = evidence;
  const nexus = findNexusSignal(container);
  const cube = attempt(findings, () =>
    findCube({ container, fileName, stated: choices.data, nexus, vectors }),
  );
  if (cube === null) return null;
  const { entry, source, evidence: why, alternatives } = cube;
  note(findings, { field: 'data', label: entryLabel(entry), source, evidence: why, alternatives });
  const axisNames = nexus?.entry === entry ? nexus.axes : dimensionLabels(entry);
  const order = attempt(findings, () =>
    findOrder({
      entry,
      format: container.format,
      stated: choices.order,
      axisNames,
      vectors: vectors.filter(({ vector }) => vector.entry !== entry),
      statedLength: statedAxisLength(choices.axis ?? {}, vectors),
      heightShapes: heightEntries(container).map(({ shape }) => shape),
    }),
  );
  if (order === null) return null;
  noteOrder(findings, order, entry);
  return {
    cube,
    order,
    ...spaceOf(entry, order),
    nameOf: (letter) => axisNames?.[order.order.indexOf(letter)] ?? null,
  };
}

function noteOrder(findings: Findings, found: FoundOrder, entry: ArrayEntry): void {
  const { order, source, evidence, alternatives, warning } = found;
  const words = { y: 'row', x: 'column', k: 'channel' } as const;
  const label = [...order]
    .map(
      (letter, axis) =>
        `${entry.shape[axis]} ${words[letter as 'y' | 'x' | 'k']}${entry.shape[axis] === 1 ? '' : 's'}`,
    )
    .join(' × ');
  note(findings, { field: 'order', label: `${order} · ${label}`, source, evidence, alternatives });
  if (warning !== null) findings.warnings.push(warning);
}

/** HDF5 dimension labels, where the file has them. */
function dimensionLabels(entry: ArrayEntry): readonly string[] | null {
  const labels = entry.attributes.DIMENSION_LABELS ?? entry.attributes.dimension_labels;
  if (labels === undefined || typeof labels === 'string' || typeof labels === 'number') return null;
  return labels.length === entry.shape.length ? labels.map(String) : null;
}

function spaceOf(entry: ArrayEntry, { order }: FoundOrder): { ny: number; nx: number } {
  const length = (letter: string): number => {
    const axis = order.indexOf(letter);
    return axis < 0 ? 1 : entry.shape[axis];
  };
  return { ny: length('y'), nx: length('x') };
}
