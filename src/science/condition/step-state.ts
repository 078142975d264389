/** Narrowing of summaries and states to the kind a step made itself. */
import { RimlightError } from '../../errors';
import type { StepState, StepSummary } from './step-plan';

/** By first row: sums are then taken in the order of the scan, whoever was ready first. */
export function inOrder(summaries: readonly StepSummary[]): readonly StepSummary[] {
  return summaries.toSorted((a, b) => a.y0 - b.y0);
}

/** @throws RimlightError 'fault' - when it is of another kind */
export function summaryOf<Kind extends StepSummary['kind']>(
  summary: StepSummary,
  kind: Kind,
): Extract<StepSummary, { readonly kind: Kind }> {
  if (isKind(summary, kind)) return summary;
  throw mixedUp(summary.kind, kind);
}

/** @throws RimlightError 'fault' - when it is of another kind */
export function stateOf<Kind extends StepState['kind']>(
  state: StepState,
  kind: Kind,
): Extract<StepState, { readonly kind: Kind }> {
  if (isKind(state, kind)) return state;
  throw mixedUp(state.kind, kind);
}

function isKind<Of extends { readonly kind: string }, Kind extends Of['kind']>(
  value: Of,
  kind: Kind,
): value is Extract<Of, { readonly kind: Kind }> {
  return value.kind === kind;
}

function mixedUp(found: string, wanted: string): RimlightError {
  return new RimlightError('fault', {
    what: `a conditioning step met "${found}" where it needs "${wanted}"`,
    where: '',
    hint: 'Please report this.',
  });
}
