import { describe, expect, it } from 'vitest';
import { example, plumbtick } from './run-cli.js';

const three = example('three-sites.json');
const json = (...args: string[]) => JSON.parse(plumbtick(['budget', three, ...args, '--json']).stdout);

describe('plumbtick budget', () => {
  it('one link: what limits it, what would help, gravity, tide labels', () => {
    const { status, stdout } = plumbtick(['budget', three, '--link', 'rp']);
    expect(status).toBe(0);
    for (const words of [
      'Uncertainty of link rp, r1 to p1',
      'U with k = 1.96',
      'The single value that would help most is datum north, W₀',
      'No gravity visit is needed',
      'How wrong would a wrong permanent-tide label be',
    ])
      expect(stdout).toContain(words);
  });

  it('the first link, if none is named; numbers as predict gives them', () => {
    const { id, y, budget, format } = json();
    expect([format, id]).toEqual(['plumbtick-budget/1', 'hr']);
    const [link] = JSON.parse(plumbtick(['predict', three, '--json']).stdout).links;
    expect(y).toEqual(link.y);
    expect(budget.groups.length).toBeGreaterThan(3);
  });

  it('what if: the same once more, the file as it was', () => {
    const { y, whatIf } = json(
      '--link',
      'rp',
      '--what-if',
      'datums.north.W0=x0.5',
      '--what-if',
      'sources.quasigeoid=1 cm',
    );
    expect(whatIf.y.u).toBeLessThan(y.u);
    expect(whatIf.changes).toEqual([
      { kind: 'part', input: 'datums.north.W0', source: null, amount: { factor: 0.5 } },
      { kind: 'source', source: 'quasigeoid', amount: { u: 0.01 } },
    ]);
    const { stdout } = plumbtick(['budget', three, '--link', 'rp', '--what-if', 'sources.quasigeoid=1 cm']);
    expect(stdout).toContain('What if, not as stated');
    expect(json('--link', 'rp').whatIf).toBe(null);
  });

  it('correlations too', () => {
    const u = (change: string) => json('--link', 'hr', '--what-if', change).whatIf.y.u as number;
    const stated = json('--link', 'hr').y.u as number;
    expect(u('sources.quasigeoid.correlationLength=1000 km')).toBeLessThan(stated);
    expect(u('sources.quasigeoid.correlationLength=10 km')).toBeGreaterThan(stated);
  });

  it('the figure', () => {
    const { status, stdout } = plumbtick(['budget', three, '--svg']);
    expect(status).toBe(0);
    expect(stdout).toMatch(/^<svg [\s\S]*<\/svg>\n$/);
  });

  it.each([
    [['--link', 'xx'], 'there is no link "xx" in the file. Links: hr, rp, ph'],
    [['--what-if', 'sites.ridge.g'], 'PATH = AMOUNT'],
    [['--what-if', 'sites.rigde.g=1'], 'sites.ridge.g'],
    [['--what-if', 'sources.quasigeoit=1 cm'], 'sources.quasigeoid'],
    [['--what-if', 'sites.ridge.g=1 kg'], 'unknown-unit'],
    [['--what-if', 'sites.ridge.g=-1 mGal'], 'negative-u'],
    [['--what-if', 'sources.quasigeoid.correlation=2'], 'from −1 to 1'],
    [['--svg', '--csv'], 'only one of --svg and --csv'],
  ] as const)('%j is refused in words', (args, words) => {
    const { status, stderr } = plumbtick(['budget', three, ...args]);
    expect(status).toBe(2);
    expect(stderr).toContain(words);
  });
});
