import { readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { example, faultsOf, file, folder, plumbtick } from './run-cli.js';

interface Point {
  T: number;
  uStat: number;
  uY: number;
  uH: number;
}
interface PlanJson {
  test: { size: number; power: number };
  links: {
    id: string;
    uptime: number;
    uSystematic: number;
    curve: Point[];
    timeToTarget: number | null;
    smallestDetectable: number | null;
  }[];
}

const json = <T>(args: readonly string[]): T => {
  const { status, stdout, stderr } = plumbtick([...args, '--json']);
  expect(stderr).toBe('');
  expect(status).toBe(0);
  return JSON.parse(stdout) as T;
};

const close = (a: number | null, b: number | null) =>
  a === null || b === null ? expect(a).toBe(b) : expect(Math.abs(a - b)).toBeLessThanOrEqual(1e-9 * Math.abs(b));

// test/data/examples/README.md: outputs of an independent solver
describe.each(['three-sites', 'other-kinds', 'triangle'])('plan --json on %s', (name) => {
  it('has the independent solver’s numbers', () => {
    const theirs = JSON.parse(readFileSync(example(`${name}.plan.json`), 'utf8')) as PlanJson;
    const ours = json<PlanJson>(['plan', example(`${name}.json`)]);
    expect(ours.test).toEqual(theirs.test);
    expect(ours.links.map(({ id }) => id)).toEqual(theirs.links.map(({ id }) => id));
    ours.links.forEach((link, i) => {
      const their = theirs.links[i]!;
      for (const key of ['uptime', 'uSystematic', 'timeToTarget', 'smallestDetectable'] as const)
        close(link[key], their[key]);
      expect(link.curve.map(({ T }) => T)).toEqual(their.curve.map(({ T }) => T));
      link.curve.forEach((p, k) => {
        for (const key of ['uStat', 'uY', 'uH'] as const) close(p[key], their.curve[k]![key]);
      });
    });
  });
});

describe('plan', () => {
  it('tells people when, what limits and what could be seen', () => {
    const { status, stdout } = plumbtick(['plan', example('three-sites.json')]);
    expect(status).toBe(0);
    // three-sites.plan.json: hr 69 712.5 s to 3 cm, 96 mm detectable; rp never
    const text = stdout.replace(/\s+/g, ' ');
    expect(text).toContain('Link hr reaches 30 mm after 0.81 d, on 1 June 2027; systematic of r1 limits');
    expect(text).toContain('A discrepancy of 96 mm against the prediction would show');
    expect(text).toContain('Link rp never reaches 30 mm: its floor is 69 mm, and offset of 171Yb');
    const csv = plumbtick(['plan', example('three-sites.json'), '--csv', '--table', 'curve']);
    expect(csv.stdout.trim().split('\n')).toHaveLength(1 + 3 * 16);
  });

  it('takes size and power, and refuses what is no test', () => {
    const strict = json<PlanJson>(['plan', example('three-sites.json'), '--size', '0.01', '--power', '0.95']);
    expect(strict.test).toEqual({ size: 0.01, power: 0.95 });
    // (2.575829 + 1.644854)/2.801585 of 96.117 mm
    expect(Math.abs(strict.links[0]!.smallestDetectable! - (0.096117014 * 4.220683) / 2.801585)).toBeLessThan(1e-7);
    for (const [option, value] of [
      ['--size', '0'],
      ['--size', '1'],
      ['--power', '5 %'],
      ['--power', '0.01'],
    ] as const) {
      const { status, stderr } = plumbtick(['plan', example('three-sites.json'), option, value]);
      expect(status).toBe(2);
      expect(stderr).toContain(option);
    }
  });

  it('refuses an unknown link by name, and intervals without a window by line', () => {
    const wrong = plumbtick(['plan', example('three-sites.json'), '--link', 'hx']);
    expect([wrong.status, wrong.stderr]).toEqual([2, expect.stringContaining('Links: hr, rp, ph')]);
    const name = file('no-window.json', {
      format: 'plumbtick-campaign/1',
      sites: [{ id: 'a', lat: 50, lon: 8, g: 9.81, determinations: [{ kind: 'potential', W: 62636000 }] }],
      clocks: [
        { id: 'k', site: 'a', transition: '87Sr', available: [{ start: 61528, end: 61529 }] },
        { id: 'l', site: 'a', transition: '87Sr' },
      ],
      links: [{ id: 'kl', from: 'k', to: 'l' }],
    });
    expect(faultsOf(plumbtick(['plan', name, '--json']))[0]).toMatchObject({ code: 'missing', path: 'window' });
  });
});

describe('break-even', () => {
  const mm = ['--b', '1.5 mm/√km', '--k', '0.1 mm/km'];
  it('compares each link with both methods', () => {
    const answer = json<{
      links: { id: string; best: string; beyond: { levelling: number | null } }[];
      levelling: unknown;
    }>(['break-even', example('three-sites.json'), ...mm]);
    expect(answer.links.map(({ id, best }) => [id, best])).toEqual([
      ['hr', 'levelling'],
      ['rp', 'gnss'],
      ['ph', 'gnss'],
    ]);
    expect(answer.levelling).toMatchObject({ origin: 'option' });
    const { stdout } = plumbtick(['break-even', example('three-sites.json'), ...mm]);
    expect(stdout.replace(/\s+/g, ' ')).toContain('Such clocks pass levelling beyond 132 km');
  });

  it('uses no published figure that was not named, and cites one that was', () => {
    const without = plumbtick(['break-even', example('triangle.json'), '--time', '10d']);
    expect(without.status).toBe(0);
    expect(without.stdout).toContain('Levelling: no b and k stated.');
    const named = plumbtick(['break-even', example('three-sites.json'), '--levelling', 'first-order-II']);
    expect(named.stdout.replace(/\s+/g, ' ')).toContain('b = 0.70 mm/√km');
    expect(named.stdout.replace(/\s+/g, ' ')).toContain('FGCC 1984');
    const near = plumbtick(['break-even', example('three-sites.json'), '--levelling', 'first-order-IV']);
    expect([near.status, near.stderr]).toEqual([2, expect.stringContaining('did you mean first-order-I')]);
  });

  it.each([
    [['--levelling', 'third-order', '--b', '1 mm/√km']],
    [['--gnss-h', '7 mm']],
    [['--correlation', '0.5']],
    [['--b', '1.5']],
    [['--detour', '1.2']],
    [['--gnss-h', '7 mm', '--geoid', '2 cm', '--correlation', '1.5']],
    [['--time', '20']],
  ])('%j: exit status', (words) => {
    const { status } = plumbtick(['break-even', example('three-sites.json'), ...words]);
    // a bare number is in the default unit: m^½ and s
    expect(status).toBe(words[0] === '--b' || words[0] === '--time' ? 0 : 2);
  });
});

describe('starting-values', () => {
  it('lists figures with their sources, and says which are from memory', () => {
    const { values } = json<{ values: { id: string; of: string; source: string; evidence: string }[] }>([
      'starting-values',
    ]);
    expect(new Set(values.map(({ of }) => of))).toEqual(
      new Set(['fibre', 'free-space', 'satellite', 'transported', 'local', 'flywheel', 'levelling', 'gnss']),
    );
    for (const { source, evidence } of values) {
      expect(source).toMatch(/\d{4}|open library/);
      expect(['seen', 'memory']).toContain(evidence);
    }
    const { stdout } = plumbtick(['starting-values', '--of', 'levelling']);
    expect(stdout).toContain('from memory, to be looked up');
    expect(stdout).not.toContain('fibre-480km');
  });
  it('gives the phase noise of a fibre where length, noise and bandwidth are said', () => {
    const { fibre } = json<{ fibre: { phase: number } }>([
      ...['starting-values', '--of', 'fibre', '--length', '420 km', '--noise', '10', '--bandwidth', '10 Hz'],
    ]);
    // τ·√(f_h·h·L)/ν, a = 1/3
    const expected = ((1.468 * 420e3) / 299_792_458) * (Math.sqrt(10 * 10 * 420) / 194.4e12);
    expect(Math.abs(fibre.phase - expected)).toBeLessThan(1e-12 * expected);
    expect(plumbtick(['starting-values', '--length', '420 km']).status).toBe(2);
    expect(plumbtick(['starting-values', '--of', 'fiber']).stderr).toContain('did you mean fibre');
  });
});

describe('transported', () => {
  it('sets before against after and says what cancels', () => {
    const clock = (id: string, site: string) => ({
      id,
      site,
      transition: '87Sr',
      systematic: [{ u: 3e-18, source: 'c' }],
    });
    const site = (id: string, W: number) => ({
      id,
      lat: 50,
      lon: 8,
      g: 9.81,
      determinations: [{ kind: 'potential', W }],
    });
    const name = file('van.json', {
      format: 'plumbtick-campaign/1',
      sources: [{ id: 'c' }],
      sites: [site('a', 62636000), site('b', 62618000)],
      clocks: [clock('ref', 'a'), clock('van', 'b')],
      links: [
        {
          id: 'rv',
          from: 'ref',
          to: 'van',
          transported: {
            clock: 'van',
            sideBySide: [
              { when: 'before', y: '1.0(3)e-17', dH: 0 },
              { when: 'after', y: '3.0(3)e-17', dH: 0 },
            ],
          },
        },
      ],
      measurements: [{ link: 'rv', y: '2.0030(4)e-13' }],
    });
    const { status, stdout } = plumbtick(['transported', name]);
    expect(status).toBe(0);
    // 2e-17 apart, u = √2·3e-18: 4.7 times
    expect(stdout.replace(/\s+/g, ' ')).toContain('Before and after differ by 180 mm, 4.7 times the u of that.');
    expect(stdout).toContain('[side-by-side-differ]');
    expect(plumbtick(['transported', example('three-sites.json')]).stdout).toContain(
      'No link has a clock that travels',
    );
  });
});

describe('import', () => {
  const sites =
    'id,lat,lon,"h / m, free","zeta / m, zero",transition,white\nn,52.3,10.4,143.2(1),43.8(2),87Sr,1e-16\ns,47.4,8.5,489.2(1),48.3(2),87Sr,1e-16\n';
  it('writes a campaign that the next command reads, and leaves a file alone that is there', () => {
    const table = file('sites.csv', sites);
    const links = file('links.csv', 'id,from,to,kind\nns,n,s,fibre\n');
    const words = [
      'import',
      table,
      '--links',
      links,
      '--window',
      '2027-05-03/2027-05-24',
      '--target',
      '3 cm',
      '--out',
      'new.json',
    ];
    const first = plumbtick(words);
    expect([first.status, first.stdout]).toEqual([
      0,
      'Wrote new.json: 2 sites, 2 clocks, 1 link. Next: plumbtick plan new.json\n',
    ]);
    expect(json<PlanJson>(['plan', 'new.json']).links).toHaveLength(1);
    expect(plumbtick(words).status).toBe(2);
    writeFileSync(path.join(folder, 'new.json'), 'x');
    expect(plumbtick([...words, '--overwrite']).stdout).toContain('Replaced new.json');
    const piped = plumbtick(['import', '-'], sites);
    expect(plumbtick(['predict', '-'], piped.stdout).status).toBe(0);
  });

  it('takes a new user from two tables to an answer: the sample of the documentation', () => {
    const sample = (name: string) => path.join(example('.'), '..', '..', '..', 'sites', `two-countries-${name}.csv`);
    const words = [
      '--window',
      '2027-05-03/2027-05-24',
      '--target',
      '3 cm',
      '--source',
      'zeta=quasigeoid:80km',
      '--source',
      'h=gnss:0.4',
    ];
    const { status, stdout } = plumbtick(['import', sample('sites'), '--links', sample('links'), ...words]);
    expect(status).toBe(0);
    const name = file('two-countries.json', stdout);
    // no tide, source or datum is left to a default
    expect(json<{ warnings: unknown[] }>(['predict', name]).warnings).toEqual([]);
    const answer = json<{ links: { id: string; best: string }[] }>([
      'break-even',
      name,
      '--levelling',
      'second-order-I',
    ]);
    expect(answer.links.map(({ id, best }) => `${id} ${best}`)).toEqual(['hs clocks', 'sg levelling', 'hg levelling']);
  });

  it('refuses by line and column, the table of links under its own name', () => {
    const bad = file('comma.csv', 'id;lat;lon\na;50,1;8\n');
    const { status, stderr } = plumbtick(['import', bad]);
    expect(status).toBe(1);
    expect(stderr).toContain('comma.csv:2:5');
    expect(stderr).toContain('write 50.1');
    const links = file('bad-links.csv', 'id,from,to\nns,n,nowhere\n');
    const second = plumbtick(['import', file('sites2.csv', sites), '--links', links, '--json']);
    expect(faultsOf(second)[0]).toMatchObject({
      code: 'unknown-id',
      path: 'bad-links.csv: links.ns.to',
      line: 2,
      column: 6,
    });
  });

  it.each([
    [['--tide', 'zeta']],
    [['--tide', 'height=free']],
    [['--source', 'zeta=geoid:far']],
    [['--window', '2027-05-03']],
    [['--separator', '|']],
    [['--overwrite']],
  ])('%j: the words of the call are wrong', (words) => {
    expect(plumbtick(['import', file('sites3.csv', sites), ...words]).status).toBe(2);
  });
});
