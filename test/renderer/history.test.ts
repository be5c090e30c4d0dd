import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { edited, GESTURE, type History, redone, startHistory, undone } from '../../renderer/state/history.ts';

/** Oracle: the plain list of states that the edits made, walked by an index. */

const LATER_MS = 60_000;

describe('undo and redo', () => {
  it('walk the states that the edits made, whatever the order', () => {
    const acts = fc.array(fc.oneof(fc.integer(), fc.constant('undo' as const), fc.constant('redo' as const)));
    fc.assert(
      fc.property(acts, (list) => {
        let history: History<{ readonly value: number }> = startHistory({ value: 0 });
        let states = [history.present];
        let at = 0;
        list.forEach((act, i) => {
          if (act === 'undo') at = Math.max(0, at - 1);
          else if (act === 'redo') at = Math.min(states.length - 1, at + 1);
          else states = [...states.slice(0, ++at), { value: act }];
          if (act === 'undo') history = undone(history);
          else if (act === 'redo') history = redone(history);
          else history = edited(history, String(act), states[at]!, i * LATER_MS);
          expect(history.present).toBe(states[at]);
          expect(history.past).toHaveLength(at);
          expect(history.future).toHaveLength(states.length - 1 - at);
        });
      }),
      { seed: 5, numRuns: 300 },
    );
  });

  it('join keystrokes of one gesture into one step, and not those after a pause or of another field', () => {
    let history = startHistory('a');
    history = edited(history, 'Name', 'ab', 0, 'name');
    history = edited(history, 'Name', 'abc', 1000, 'name');
    expect(history.past).toEqual([{ label: 'Name', value: 'a' }]);
    history = edited(history, 'Name', 'abcd', 1000 + 1501, 'name');
    expect(history.past).toHaveLength(2);
    history = edited(history, 'Note', 'abcd!', 2600, 'note');
    expect(history.past).toHaveLength(3);
    expect(undone(history).present).toBe('abcd');
  });

  it('join a pull that rests in between, and not the next pull of the same lever', () => {
    let history = edited(startHistory(1), 'Rise time', 2, 0, `${GESTURE}1`);
    history = edited(history, 'Rise time', 3, LATER_MS, `${GESTURE}1`);
    expect(history.past).toHaveLength(1);
    history = edited(history, 'Rise time', 4, LATER_MS + 1, `${GESTURE}2`);
    expect(history.past.map(({ value }) => value)).toEqual([1, 3]);
  });

  it('do not join an edit after undo with the one before it', () => {
    let history = edited(startHistory('a'), 'Name', 'ab', 0, 'name');
    history = edited(undone(history), 'Name', 'ax', 100, 'name');
    expect(history.past).toHaveLength(1);
    expect(undone(history).present).toBe('a');
  });

  it('leave everything as it is for an edit that changes nothing', () => {
    const history = edited(startHistory('a'), 'Name', 'ab', 0);
    expect(edited(history, 'Name', 'ab', LATER_MS)).toBe(history);
  });

  it('keep the step names on both sides', () => {
    const history = undone(edited(startHistory(1), 'Rise time', 2, 0));
    expect(history.future[0]!.label).toBe('Rise time');
    expect(redone(history).past[0]!.label).toBe('Rise time');
  });
});
