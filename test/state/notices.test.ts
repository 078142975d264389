import { describe, expect, it } from 'vitest';
import { RimlightError } from '../../src/errors';
import { createNotices } from '../../src/state/notices';

const texts = ({ getState }: ReturnType<typeof createNotices>): readonly string[] =>
  getState().notices.map(({ text }) => text);

describe('notices', () => {
  it('tell what went wrong, where, and what to do', () => {
    const notices = createNotices();
    notices.sayError(
      new RimlightError('scan', { what: 'the file ends early', where: 'a.npy', hint: 'Copy it.' }),
    );
    expect(notices.getState().notices).toMatchObject([
      { tone: 'error', text: 'The file ends early (a.npy).', hint: 'Copy it.', action: null },
    ]);
  });

  it('say nothing of what the user stopped', () => {
    const notices = createNotices();
    notices.sayError(new RimlightError('cancelled', { what: 'stopped', where: '', hint: '' }));
    expect(texts(notices)).toEqual([]);
  });

  it('are each said once, the newest last, four at most', () => {
    const notices = createNotices();
    for (const text of ['a', 'b', 'c', 'a', 'd']) notices.say('done', text);
    expect(texts(notices)).toEqual(['b', 'c', 'a', 'd']);
    notices.say('done', 'e');
    expect(texts(notices)).toEqual(['c', 'a', 'd', 'e']);
  });

  it('are dismissed one at a time, an answered one staying gone', () => {
    const notices = createNotices();
    notices.say('done', 'a');
    const id = notices.say('done', 'b');
    notices.dismiss(id);
    notices.dismiss(id);
    expect(texts(notices)).toEqual(['a']);
  });
});
