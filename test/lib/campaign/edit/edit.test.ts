import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  applyEdit,
  backTo,
  type CampaignFile,
  type Edit,
  EditError,
  edited,
  type FilePath,
  historyOf,
  isList,
  isObject,
  redone,
  undone,
  valueAt,
} from '../../../../lib/campaign/edit/index.js';
import { readCampaignValue } from '../../../../lib/campaign/read.js';

const file = (name: string): CampaignFile =>
  JSON.parse(readFileSync(new URL(`../../../data/examples/${name}.json`, import.meta.url), 'utf8'));
const base = file('three-sites');
const codeOf = (run: () => unknown) => {
  try {
    run();
  } catch (e) {
    return (e as EditError).code;
  }
  return null;
};

describe('set', () => {
  test('replaces a value and nothing else', () => {
    const next = applyEdit(base, { kind: 'set', path: ['sites', 0, 'g'], value: '9.8(1) m/s²' });
    expect(valueAt(next, ['sites', 0, 'g'])).toBe('9.8(1) m/s²');
    expect(valueAt(next, ['sites', 1])).toBe(valueAt(base, ['sites', 1]));
    expect(valueAt(base, ['sites', 0, 'g'])).toBe('9.8186110(30) m/s²');
  });
  test('a key of a bare quantity makes it an object; what was typed stays', () => {
    const next = applyEdit(base, { kind: 'set', path: ['clocks', 0, 'tie', 0, 'dH', 'source'], value: 'levelling' });
    expect(valueAt(next, ['clocks', 0, 'tie', 0, 'dH'])).toEqual({ value: '1.1020(4) m', source: 'levelling' });
    expect(readCampaignValue(next).campaign.clocks[0]!.tie[0]!.dH.parts[0]!.source).toBe('levelling');
  });
  test('refuses a place that cannot be', () => {
    expect(codeOf(() => applyEdit(base, { kind: 'set', path: ['sites', 7, 'g'], value: 1 }))).toBe('no-such-place');
    expect(codeOf(() => applyEdit(base, { kind: 'set', path: ['__proto__', 'x'], value: 1 }))).toBe('unsafe-key');
    expect(codeOf(() => applyEdit(base, { kind: 'set', path: ['tide', 0], value: 1 }))).toBe('not-a-list');
    expect(({} as { x?: number }).x).toBeUndefined();
  });
});

describe('lists', () => {
  test('insert, move and remove', () => {
    const added = applyEdit(base, { kind: 'insert', path: ['sources'], index: 1, value: { id: 'new' } });
    expect((valueAt(added, ['sources']) as { id: string }[]).map((s) => s.id)).toEqual([
      'quasigeoid',
      'new',
      'gnss',
      'levelling',
      'sr-coefficients',
    ]);
    const moved = applyEdit(added, { kind: 'move', path: ['sources'], from: 1, to: 4 });
    expect((valueAt(moved, ['sources', 4]) as { id: string }).id).toBe('new');
    expect(applyEdit(moved, { kind: 'remove', path: ['sources', 4] })).toEqual(base);
    expect(applyEdit(base, { kind: 'insert', path: ['sites', 1, 'note-list'], value: 1 })).toMatchObject({});
    expect(codeOf(() => applyEdit(base, { kind: 'insert', path: ['title'], value: 1 }))).toBe('not-a-list');
    expect(codeOf(() => applyEdit(base, { kind: 'move', path: ['sources'], from: 0, to: 9 }))).toBe('no-such-place');
    expect(codeOf(() => applyEdit(base, { kind: 'remove', path: ['nothing'] }))).toBe('no-such-place');
  });
});

describe('rename follows every reference', () => {
  test.each([
    ['sites', 'ridge', 'crest'],
    ['clocks', 'r1', 'r2'],
    ['sources', 'quasigeoid', 'qg'],
    ['datums', 'north', 'n'],
    ['links', 'hr', 'h-r'],
    ['measurements', 'm1', 'first'],
  ] as const)('%s %s', (list, from, to) => {
    const next = applyEdit(base, { kind: 'rename', list, from, to });
    // still a valid campaign: no reference dangles; and no trace of the old id
    readCampaignValue(next);
    expect(JSON.stringify(next)).not.toContain(`"${from}"`);
    expect(applyEdit(next, { kind: 'rename', list, from: to, to: from })).toEqual(base);
  });
  test('levelled-from follows its site', () => {
    const next = applyEdit(file('other-kinds'), { kind: 'rename', list: 'sites', from: 'mill', to: 'works' });
    readCampaignValue(next);
    expect(valueAt(next, ['sites', 1, 'determinations', 0, 'site'])).toBe('works');
  });
  test('an id that is taken or unknown is refused', () => {
    expect(codeOf(() => applyEdit(base, { kind: 'rename', list: 'sites', from: 'ridge', to: 'plain' }))).toBe(
      'id-taken',
    );
    expect(codeOf(() => applyEdit(base, { kind: 'rename', list: 'sites', from: 'x', to: 'y' }))).toBe('no-such-id');
  });
});

describe('history', () => {
  test('undo, redo, back to here; a new edit ends the future', () => {
    const one = edited(historyOf(base), { kind: 'set', path: ['title'], value: 'A' });
    const two = edited(one, { kind: 'set', path: ['title'], value: 'B' });
    expect(two.past.map((c) => c.words)).toEqual(['title: Three sites, two routes → A', 'title: A → B']);
    expect(undone(undone(two)).present).toBe(base);
    expect(redone(redone(undone(undone(two)))).present).toEqual(two.present);
    expect(backTo(two, 0).present).toBe(base);
    expect(edited(undone(two), { kind: 'set', path: ['title'], value: 'C' }).future).toEqual([]);
    expect(undone(historyOf(base)).present).toBe(base);
  });
  test('an edit that changes nothing leaves no trace', () => {
    const h = historyOf(base);
    expect(edited(h, { kind: 'set', path: ['tide'], value: 'mean' })).toBe(h);
  });
});

/** Every place of a file. */
function places(value: CampaignFile, path: FilePath = []): FilePath[] {
  const inner = isList(value)
    ? value.flatMap((v, i) => places(v, [...path, i]))
    : isObject(value)
      ? Object.entries(value).flatMap(([k, v]) => places(v, [...path, k]))
      : [];
  return [path, ...inner];
}

test('10 000 random edits, undos and redos end where replaying the past ends', () => {
  const value = fc.oneof(
    fc.constant('1.0(1) m'),
    fc.double({ noNaN: true }),
    fc.constant(null),
    fc.constant({ id: 'x' }),
    fc.string(),
  );
  const seeded = fc.sample(fc.tuple(fc.nat(), fc.nat(9), value, fc.nat(6)), { numRuns: 10_000, seed: 20271 });
  let h = historyOf(base);
  const start = h.present;
  for (const [where, what, v, index] of seeded) {
    if (what === 0) h = undone(h);
    else if (what === 1) h = redone(h);
    else {
      const all = places(h.present);
      const path = all[where % all.length]!;
      const edit: Edit =
        what < 5
          ? { kind: 'set', path, value: v }
          : what < 7
            ? { kind: 'insert', path, index, value: v }
            : what < 8
              ? { kind: 'remove', path }
              : what < 9
                ? { kind: 'move', path, from: index, to: 0 }
                : { kind: 'replace', value: start };
      try {
        h = edited(h, edit);
      } catch (e) {
        expect(e).toBeInstanceOf(EditError);
      }
    }
  }
  const replayed = h.past.reduce<CampaignFile>((f, c) => applyEdit(f, c.edit), start);
  expect(replayed).toEqual(h.present);
  let back = h;
  while (back.past.length > 0) back = undone(back);
  expect(back.present).toEqual(start);
});
