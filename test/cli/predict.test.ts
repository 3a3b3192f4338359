import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { example, plumbtick } from './run-cli.js';

interface Estimate {
  value: number;
  u: number;
}
interface Prediction {
  format: string;
  tide: string;
  sites: { id: string; W: Estimate; C: Estimate; determinations: { kind: string; W: Estimate }[] }[];
  combination: { chi2: number; dof: number; p: number } | null;
  clocks: { id: string; site: string; W: Estimate; redshift: Estimate }[];
  links: {
    id: string;
    from: string;
    to: string;
    dW: Estimate;
    y: Estimate;
    dH: Estimate;
    dHNormal: Estimate;
    offsetHz: Estimate;
    budget: { input: string; value: number; u: number; sensitivity: number; uy: number; share: number }[];
  }[];
  correlations: { links: string[]; matrix: number[][] };
  warnings: { code: string; path: string; message: string }[];
}

const names = ['three-sites', 'other-kinds', 'triangle'];

function close(ours: Estimate, theirs: Estimate, tolerance: number, what: string): void {
  expect(Math.abs(ours.value - theirs.value), `${what}: ${ours.value} for ${theirs.value}`).toBeLessThanOrEqual(
    tolerance,
  );
  expect(Math.abs(ours.u - theirs.u), `u of ${what}: ${ours.u} for ${theirs.u}`).toBeLessThanOrEqual(1e-6 * theirs.u);
}

// test/data/examples/README.md: outputs of an independent solver, not published values.
describe.each(names)('predict --json on %s, against an independent solver', (name) => {
  const theirs = JSON.parse(readFileSync(example(`${name}.predict.json`), 'utf8')) as Prediction;
  const { status, stdout, stderr } = plumbtick(['predict', example(`${name}.json`), '--json']);
  const ours = JSON.parse(stdout) as Prediction;

  it('is one object with the stated keys and nothing beside it', () => {
    expect([status, stderr]).toEqual([0, '']);
    expect(Object.keys(ours)).toEqual(expect.arrayContaining(Object.keys(theirs)));
    expect([ours.format, ours.tide]).toEqual([theirs.format, theirs.tide]);
    for (const [i, link] of theirs.links.entries())
      expect(Object.keys(ours.links[i]!)).toEqual(expect.arrayContaining(Object.keys(link)));
    for (const { code, path, message } of ours.warnings)
      expect([typeof code, typeof path, typeof message]).toEqual(['string', 'string', 'string']);
  });

  it('gives W of sites and clocks to 1e-5 m²/s²', () => {
    expect(ours.sites.map(({ id }) => id)).toEqual(theirs.sites.map(({ id }) => id));
    for (const [i, site] of theirs.sites.entries()) {
      close(ours.sites[i]!.W, site.W, 1e-5, `W of ${site.id}`);
      close(ours.sites[i]!.C, site.C, 1e-5, `C of ${site.id}`);
      for (const [n, { kind, W }] of site.determinations.entries()) {
        expect(ours.sites[i]!.determinations[n]!.kind).toBe(kind);
        close(ours.sites[i]!.determinations[n]!.W, W, 1e-5, `${site.id} ${kind}`);
      }
    }
    for (const [i, clock] of theirs.clocks.entries()) {
      close(ours.clocks[i]!.W, clock.W, 1e-5, `W of clock ${clock.id}`);
      close(ours.clocks[i]!.redshift, clock.redshift, 1e-21, `redshift of ${clock.id}`);
    }
  });

  it('gives y to 1e-21, u to 1e-6 relative, lengths to 1e-6 m', () => {
    for (const [i, link] of theirs.links.entries()) {
      const mine = ours.links[i]!;
      expect([mine.id, mine.from, mine.to]).toEqual([link.id, link.from, link.to]);
      close(mine.dW, link.dW, 1e-5, `dW of ${link.id}`);
      close(mine.y, link.y, 1e-21, `y of ${link.id}`);
      close(mine.dH, link.dH, 1e-6, `dH of ${link.id}`);
      close(mine.dHNormal, link.dHNormal, 1e-6, `dHNormal of ${link.id}`);
      close(mine.offsetHz, link.offsetHz, 1e-6, `offset of ${link.id}`); // 1e-21 of 1e15 Hz
    }
  });

  it('gives the budget with shares to 1e-6 and the correlations', () => {
    for (const [i, { id, budget }] of theirs.links.entries()) {
      const mine = new Map(ours.links[i]!.budget.map((row) => [row.input, row]));
      // rows at the limit uy > 1e-12·u(y) may be there or not; those that weigh must be
      for (const row of budget.filter(({ share }) => Math.abs(share) > 1e-9)) {
        const own = mine.get(row.input);
        expect(own, `${id}: ${row.input}`).toBeDefined();
        expect(Math.abs(own!.share - row.share), `${id}: share of ${row.input}`).toBeLessThanOrEqual(1e-6);
        expect(Math.abs(own!.sensitivity / row.sensitivity - 1), `${id}: c of ${row.input}`).toBeLessThanOrEqual(1e-6);
      }
      expect(Math.abs(ours.links[i]!.budget.reduce((sum, { share }) => sum + share, 0) - 1)).toBeLessThanOrEqual(1e-9);
    }
    for (const [i, row] of theirs.correlations.matrix.entries())
      for (const [j, rho] of row.entries())
        expect(Math.abs(ours.correlations.matrix[i]![j]! - rho)).toBeLessThanOrEqual(1e-6);
  });
});

describe('predict for people', () => {
  const campaign = example('three-sites.json');
  const { status, stdout, stderr } = plumbtick(['predict', campaign]);
  const lines = stdout.split('\n');

  it('begins with the title and the finding, limit named', () => {
    expect([status, stderr]).toEqual([0, '']);
    expect(lines[0]).toBe('Three sites, two routes');
    expect(stdout.replaceAll('\n', ' ')).toContain(
      'The least certain link, rp, is predicted to 44\u00a0mm, 4.8e-18. About half of the variance is datums.north.W0.',
    );
  });

  it('shows three scales side by side, each rounded on its own u, the unit in the head', () => {
    const head = lines.find((line) => line.startsWith('link  from'))!;
    expect(head.split(/\s{2,}/)).toEqual([
      'link',
      'from',
      'to',
      'length / m',
      'ΔW / m²/s²',
      'y / 1e-18',
      'normal height / m',
      'offset / Hz',
    ]);
    const row = lines.find((line) => line.startsWith('rp  '))!;
    expect(row.split(/ {2,}/)).toEqual([
      'rp',
      'r1',
      'p1',
      '\u2212850.012(44)',
      '\u22128343.76(44)',
      '\u221292\u00a0836.8(4.8)',
      '\u2212849.936(44)',
      '\u221248.1169(25)',
    ]);
  });

  it('aligns a column on the decimal point, never on the bracket', () => {
    const y = ['hr', 'rp', 'ph'].map((id) => lines.find((line) => line.startsWith(`${id}  `))!);
    const columns = y.map((line) => {
      const at = line.search(/[+\u2212][\d\u00a0]+\.\d\(\d\.\d\)/); // y: the one with the point inside the bracket
      return line.indexOf('.', at);
    });
    expect(new Set(columns).size).toBe(1);
  });

  it('states the conventions under the tables', () => {
    const text = stdout.replaceAll('\n', ' ');
    for (const words of [
      'Permanent tide: mean',
      'y > 0 when the second clock of a link (to) runs fast',
      'W₀: north 62\u00a0636\u00a0853.40(30)\u00a0m²/s²',
      'length is the length equivalent ΔW/ḡ',
      'that is the normal height',
      'Computed by Plumbtick',
    ])
      expect(text).toContain(words);
  });

  it('prints a caution with its path and code', () => {
    expect(stdout).toMatch(/Caution: sites\.ridge: .*\n?.*\[combined-outside\]/);
  });

  it('sums up small rows, and --link prints the whole budget', () => {
    expect(stdout).toContain('10 more inputs together');
    const whole = plumbtick(['predict', campaign, '--link', 'hr']).stdout;
    expect(whole).not.toContain('more inputs together');
    expect(whole).toContain('sites.plain.determinations.0.zeta');
  });
});

describe('other forms', () => {
  const campaign = example('three-sites.json');

  it('CSV is unrounded, with plain minus and u in a column of its own; cautions go to standard error', () => {
    const { status, stdout, stderr } = plumbtick(['predict', campaign, '--csv', '--table', 'links']);
    expect(status).toBe(0);
    const [head, , second, ...rest] = stdout.split('\r\n');
    expect(head).toBe(
      'link,from,to,length / m,u(length) / m,ΔW / m²/s²,u(ΔW) / m²/s²,y / 1e-18,u(y) / 1e-18,normal height / m,u(normal height) / m,offset / Hz,u(offset) / Hz',
    );
    const fields = second!.split(',');
    expect(fields).toHaveLength(13);
    expect(fields.slice(0, 3)).toEqual(['rp', 'r1', 'p1']);
    const expected = JSON.parse(readFileSync(example('three-sites.predict.json'), 'utf8')) as Prediction;
    expect(Math.abs(Number(fields[7]) - expected.links[1]!.y.value * 1e18)).toBeLessThanOrEqual(1e-3); // 1e-21
    expect(rest).toHaveLength(2);
    expect(stderr).toContain('[combined-outside]');
  });

  it('Markdown has a table per answer', () => {
    const { status, stdout } = plumbtick(['predict', campaign, '--markdown']);
    expect(status).toBe(0);
    expect(stdout).toContain('# Three sites, two routes');
    expect(stdout).toContain('| link | from | to | length / m |');
    expect(stdout).toContain('| --- | --- | --- | ---: |');
  });

  it('a result goes on to the next program: the table of links from a pipe', () => {
    const text = readFileSync(campaign, 'utf8');
    expect(plumbtick(['predict', '-', '--json'], text).stdout).toBe(plumbtick(['predict', campaign, '--json']).stdout);
  });
});

describe('the tables in markup', () => {
  it.each([
    ['--mediawiki', /^== .* ==\n/, '{| class="wikitable"'],
    ['--latex', /^% Computed by Plumbtick /, '\\begin{tabular}'],
    ['--html', /^<section>\n<h2>/, '<caption>'],
  ] as const)('%s', (form, beginning, table) => {
    const { status, stdout, stderr } = plumbtick(['predict', example('three-sites.json'), form]);
    expect(status).toBe(0);
    expect(stderr).toBe('');
    expect(stdout).toMatch(beginning);
    expect(stdout).toContain(table);
    const one = plumbtick(['predict', example('three-sites.json'), form, '--table', 'links']).stdout;
    expect(stdout).toContain(one.trim());
  });
});
