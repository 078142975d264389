/**
 * Errors as plain data across the worker boundary, where an Error keeps its message and loses all
 * else. Registered on both sides as the way thrown values travel.
 */
import { type TransferHandler, transferHandlers } from 'comlink';
import { type ErrorKind, ensureRimlightError, RimlightError } from '../src/errors';

export interface WireError {
  readonly kind: ErrorKind;
  readonly what: string;
  readonly where: string;
  readonly hint: string;
  readonly stack: string;
  /** what caused it, as text; null for nothing */
  readonly cause: WireCause | null;
}

interface WireCause {
  readonly name: string;
  readonly message: string;
  readonly stack: string;
}

/** Any thrown value; what is no RimlightError becomes a `fault`. */
export function toWire(thrown: unknown): WireError {
  const error = ensureRimlightError(thrown);
  const { kind, what, where, hint, stack = '', cause } = error;
  return { kind, what, where, hint, stack, cause: cause === undefined ? null : causeOf(cause) };
}

function causeOf(cause: unknown): WireCause {
  if (!(cause instanceof Error)) return { name: 'Error', message: String(cause), stack: '' };
  return { name: cause.name, message: cause.message, stack: cause.stack ?? '' };
}

export function fromWire(wire: WireError): RimlightError {
  const { kind, what, where, hint, stack, cause } = wire;
  const error =
    cause === null
      ? new RimlightError(kind, { what, where, hint })
      : new RimlightError(kind, { what, where, hint }, { cause: errorLike(cause) });
  if (stack !== '') error.stack = stack;
  return error;
}

function errorLike({ name, message, stack }: WireCause): Error {
  const error = new Error(message);
  error.name = name;
  if (stack !== '') error.stack = stack;
  return error;
}

/** What comlink hands to the handler of thrown values. */
interface Thrown {
  readonly value: unknown;
}

/** Makes comlink carry thrown values as WireErrors; to be called on both sides, any number of times. */
export function registerWireErrors(): void {
  const usual = transferHandlers.get('throw');
  if (usual === undefined) {
    throw new RimlightError('fault', {
      what: 'the worker library has no handler for thrown values',
      where: '',
      hint: 'Please report this.',
    });
  }
  const handler: TransferHandler<Thrown, WireError> = {
    canHandle: (value): value is Thrown => usual.canHandle(value),
    serialize: ({ value }) => [toWire(value), []],
    deserialize: (wire) => {
      throw fromWire(wire);
    },
  };
  transferHandlers.set('throw', handler);
}
