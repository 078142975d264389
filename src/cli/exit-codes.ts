/** How a call ends, as a number: part of the public contract. */
import { assertUnreachable, type ErrorKind } from '../errors';

export const done = 0;
/** several scans, some failed, the others are done */
export const someFailed = 4;

export function exitCodeOf(kind: ErrorKind): number {
  switch (kind) {
    case 'fault':
      return 1;
    case 'usage':
    case 'recipe':
      return 2;
    case 'scan':
      return 3;
    // As shells count a program that was ended by Ctrl-C (128 + SIGINT).
    case 'cancelled':
      return 130;
    default:
      return assertUnreachable(kind);
  }
}
