/** Who a key press belongs to: what has the focus, or the whole screen. */

/** The part of an element that decides. */
export interface KeyTarget {
  readonly tagName: string;
  readonly isContentEditable: boolean;
  /** of an input */
  readonly type?: string;
}

/** Inputs that nothing is typed into: with a slider under the hand, letters mean what they mean elsewhere. */
const untyped = /^(range|checkbox|radio|button|submit|reset|file|color|image)$/;

export function takesText({ tagName, isContentEditable, type = 'text' }: KeyTarget): boolean {
  if (isContentEditable) return true;
  if (tagName === 'INPUT') return !untyped.test(type);
  return tagName === 'TEXTAREA' || tagName === 'SELECT';
}
