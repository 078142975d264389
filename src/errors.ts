/**
 * Errors a user can meet: what went wrong, where, and what to do about it.
 * The command line and the app print the same sentence. Imports nothing, so every layer may use it.
 */

/** `usage` and `recipe` exit with 2, `scan` with 3, `fault` (a bug of ours) with 1; `cancelled` was asked for by the user. */
export type ErrorKind = 'usage' | 'recipe' | 'scan' | 'fault' | 'cancelled';

export interface ErrorParts {
  /** A plain sentence part with the offending value, without a full stop. */
  readonly what: string;
  /** File, dataset, recipe path, line or step; empty when there is no place to name. */
  readonly where: string;
  /** One action the user can take, a whole sentence. */
  readonly hint: string;
}

export class RimlightError extends Error implements ErrorParts {
  override readonly name = 'RimlightError';
  readonly kind: ErrorKind;
  readonly what: string;
  readonly where: string;
  readonly hint: string;

  constructor(kind: ErrorKind, parts: ErrorParts, options?: { cause?: unknown }) {
    super(errorSentence(parts), options);
    this.kind = kind;
    this.what = parts.what;
    this.where = parts.where;
    this.hint = parts.hint;
  }
}

/** `WHAT (WHERE). WHAT TO DO`, on one line. */
export function errorSentence({ what, where, hint }: ErrorParts): string {
  const place = where === '' ? '' : ` (${where})`;
  return `${what}${place}. ${hint}`.replace(/\s*[\r\n]+\s*/g, ' ').trim();
}

export function isRimlightError(error: unknown): error is RimlightError {
  return error instanceof RimlightError;
}

/** Any thrown value as a RimlightError; what we did not foresee becomes a `fault` with its message kept. */
export function ensureRimlightError(error: unknown): RimlightError {
  if (isRimlightError(error)) return error;
  const message = error instanceof Error ? error.message : String(error);
  return new RimlightError(
    'fault',
    {
      what: `something went wrong inside the program: ${message}`,
      where: '',
      hint: 'Please report it with the file or recipe that caused it.',
    },
    { cause: error },
  );
}

/** Thrown where a long call is stopped by its AbortSignal. */
export function cancelledError(what: string): RimlightError {
  return new RimlightError('cancelled', {
    what: `${what} was stopped`,
    where: '',
    hint: 'Start it again to continue.',
  });
}

export function throwIfAborted(signal: AbortSignal | undefined, what: string): void {
  if (signal?.aborted === true) throw cancelledError(what);
}

/** Closes a union: the compiler objects when a case is missing. */
export function assertUnreachable(value: never): never {
  throw new RimlightError('fault', {
    what: `unexpected case ${JSON.stringify(value)}`,
    where: '',
    hint: 'Please report this.',
  });
}
