/** Errors across a port: nothing of them may be lost. */
import { expose, wrap } from 'comlink';
import { describe, expect, it } from 'vitest';
import { type ErrorKind, isRimlightError, RimlightError } from '../../src/errors';
import { fromWire, registerWireErrors, toWire } from '../../workers/wire-errors';

const kinds: readonly ErrorKind[] = ['usage', 'recipe', 'scan', 'fault', 'cancelled'];

/** What a promise of the other side rejects with. */
async function thrownAcross(thrown: unknown): Promise<unknown> {
  registerWireErrors();
  registerWireErrors();
  const { port1, port2 } = new MessageChannel();
  expose({ fail: () => Promise.reject(thrown) }, port1);
  const remote = wrap<{ fail(): Promise<void> }>(port2);
  try {
    return await remote.fail().then(
      () => null,
      (error: unknown) => error,
    );
  } finally {
    port1.close();
    port2.close();
  }
}

describe('an error thrown on the other side of a port', () => {
  it.each(kinds)('keeps all fields when its kind is %s', async (kind) => {
    const cause = new TypeError('the reason');
    const parts = { what: 'it went wrong', where: 'a file', hint: 'Do this.' };
    const thrown = new RimlightError(kind, parts, { cause });
    const error = await thrownAcross(thrown);
    expect(isRimlightError(error)).toBe(true);
    expect(error).toMatchObject({ kind, ...parts, name: 'RimlightError', message: thrown.message });
    const { cause: arrived, stack } = error as RimlightError;
    expect(arrived).toMatchObject({ name: 'TypeError', message: 'the reason' });
    expect(stack).toBe(thrown.stack);
  });

  it('becomes a fault with its message kept when it is not one of ours', async () => {
    expect(await thrownAcross(new RangeError('out of range'))).toMatchObject({
      kind: 'fault',
      what: expect.stringContaining('out of range'),
      cause: { name: 'RangeError' },
    });
    expect(await thrownAcross('just a text')).toMatchObject({
      kind: 'fault',
      what: expect.stringContaining('just a text'),
    });
  });
});

describe('the wire form', () => {
  it('is plain data that can be cloned, and turns back into the same', () => {
    const parts = { what: 'w', where: '', hint: 'h' };
    const error = new RimlightError('scan', parts);
    const wire = structuredClone(toWire(error));
    expect(wire.cause).toBeNull();
    expect(fromWire(wire)).toMatchObject({ kind: 'scan', ...parts });
    expect(fromWire(wire).cause).toBeUndefined();
    expect(toWire(fromWire(wire))).toEqual(wire);
  });
});
