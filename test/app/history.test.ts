import { describe, expect, it } from 'vitest';
import { applyEverywhere, edit, redo, startHistory, undo } from '../../app/state/history.ts';

describe('undo and redo', () => {
  it('walks back and forth through edits', () => {
    let h = startHistory('a');
    h = edit(h, 'b', 'k', 0);
    h = edit(h, 'c', 'other', 10);
    expect(undo(h).present).toBe('b');
    expect(undo(undo(h)).present).toBe('a');
    expect(undo(undo(undo(h))).present).toBe('a');
    expect(redo(undo(h)).present).toBe('c');
  });

  it('joins quick edits of one field into one step, and not slow ones', () => {
    let h = startHistory('');
    h = edit(h, 'x', 'label', 0);
    h = edit(h, 'xy', 'label', 500);
    expect(undo(h).present).toBe('');
    h = edit(h, 'xyz', 'label', 2000);
    expect(undo(h).present).toBe('xy');
  });

  it('never joins the first edit after an undo to the one before', () => {
    let h = edit(edit(startHistory('a'), 'b', 'k', 0), 'c', 'j', 1);
    h = edit(undo(h), 'd', 'k', 2);
    expect(undo(h).present).toBe('b');
  });

  it('a result reaches every state, so that undo keeps it', () => {
    const h = applyEverywhere(edit(startHistory({ n: 1, r: 0 }), { n: 2, r: 0 }, 'k', 0), (s) => ({ ...s, r: 9 }));
    expect(h.present).toEqual({ n: 2, r: 9 });
    expect(undo(h).present).toEqual({ n: 1, r: 9 });
  });
});
