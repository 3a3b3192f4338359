import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { commands } from '../../lib/cli/commands/index.js';
import { called } from './in-process.js';
import { example, file, folder, plumbtick } from './run-cli.js';

const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')) as {
  version: string;
};

describe('help for someone who meets it for the first time', () => {
  it('says the job, where to begin and every command', () => {
    const { status, stdout, stderr } = plumbtick(['--help']);
    expect(status).toBe(0);
    expect(stderr).toBe('');
    for (const word of ['height comparisons by optical clocks', 'plumbtick floors --dH', 'y > 0', 'Exit status'])
      expect(stdout).toContain(word);
    for (const { name } of commands) expect(stdout).toMatch(new RegExp(`^  ${name} `, 'm'));
  });

  it('fits a terminal of 110 columns', async () => {
    const texts = [['--help'], ...commands.map(({ name }) => [name, '--help'])];
    for (const args of texts)
      for (const line of (await called(args)).stdout.split('\n')) expect(line.length, line).toBeLessThanOrEqual(110);
  });

  it('tells about one command with its options, by both spellings', async () => {
    const { status, stdout } = await called(['floors', '--help']);
    expect(status).toBe(0);
    for (const option of ['--dH LENGTH', '--g ACCELERATION', '--transition NAME', '--json', '--csv', '--markdown'])
      expect(stdout).toContain(option);
    expect((await called(['help', 'floors'])).stdout).toBe(stdout);
  });

  it('prints the version of the package', () => {
    expect(plumbtick(['--version'])).toMatchObject({ status: 0, stdout: `${version}\n` });
  });
});

describe('a call whose words are wrong: exit status 2, said on standard error', () => {
  it.each([
    [[], 'Begin here'],
    [['predcit', 'x.json'], 'did you mean predict?'],
    [['--json', 'predict', 'x.json'], 'the command comes first'],
    [['predict'], 'predict needs a file'],
    [['predict', 'a.json', 'b.json'], 'takes one file, but was given 2'],
    [['predict', 'a.json', '--jsn'], 'there is no option --jsn; did you mean --json?'],
    [['predict', 'a.json', '-j'], 'there is no option -j'],
    [['predict', 'a.json', '--json', '--csv'], 'only one of --json and --csv'],
    [['predict', 'a.json', '--json=yes'], '--json takes no value'],
    [['predict', 'a.json', '--table', 'links'], '--table goes with --csv or --markdown'],
    [['predict', 'a.json', '--link'], '--link needs a value'],
    [['floors', 'a.json'], 'floors takes no file'],
    [['floors', '--dh', '3 m'], 'there is no option --dh; did you mean --dH?'],
    [['floors', '--dH', '3 m', '--dH', '4 m'], '--dH is given twice'],
    [['new', '--overwrite'], '--overwrite goes with --out FILE'],
    [['help', 'nothing'], 'there is no command "nothing"'],
  ])('%j', async (args, words) => {
    const { status, stdout, stderr } = await called(args);
    expect(status).toBe(2);
    expect(stdout).toBe('');
    expect(stderr).toContain(words);
  });

  it('names the links and tables there are', async () => {
    const campaign = example('three-sites.json');
    const link = await called(['predict', campaign, '--link', 'hx']);
    expect(link).toMatchObject({ status: 2, stdout: '' });
    expect(link.stderr).toContain('no link "hx" in the file. Links: hr, rp, ph');
    const table = await called(['predict', campaign, '--csv', '--table', 'link']);
    expect(table).toMatchObject({ status: 2, stdout: '' });
    expect(table.stderr).toContain('Tables: links, budget, sites');
  });

  it('shows every unreadable option with a mark under the character', async () => {
    const { status, stderr } = await called(['floors', '--dH', '12,348 m', '--g', '9.8125() m/s²']);
    expect(status).toBe(2);
    const lines = stderr.split('\n');
    const at = lines.findIndex((line) => line.includes('12,348 m'));
    expect(lines[at + 1]!.indexOf('^')).toBe(lines[at]!.indexOf(','));
    expect(stderr).toContain('decimal-comma');
    expect(stderr).toContain('empty-bracket');
  });
});

describe('a file that cannot be read: exit status 1', () => {
  it.each([
    ['missing.json', 'no-such-file'],
    ['.', 'not-a-file'],
  ])('%s', (name, code) => {
    expect(JSON.parse(plumbtick(['predict', name, '--json']).stdout)).toMatchObject({ faults: [{ code }] });
    const { status, stdout, stderr } = plumbtick(['predict', name]);
    expect([status, stdout]).toEqual([1, '']);
    expect(stderr).toContain(code);
  });

  it('refuses what is no UTF-8 and says what to do', () => {
    const utf16 = new Uint8Array([0xff, 0xfe, 0x7b, 0x00, 0x7d, 0x00]);
    const latin1 = new Uint8Array([0x7b, 0x22, 0xe9, 0x22, 0x7d]);
    for (const bytes of [utf16, latin1]) {
      const { status, stdout } = plumbtick(['check', '-', '--json'], bytes);
      expect(status).toBe(1);
      expect(JSON.parse(stdout)).toMatchObject({ faults: [{ code: 'not-utf8' }] });
    }
  });

  it('takes a byte order mark', () => {
    const text = readFileSync(example('three-sites.json'), 'utf8');
    expect(plumbtick(['check', '-'], `\uFEFF${text}`).status).toBe(0);
  });
});

describe('new', () => {
  it('writes a campaign that can be used as it stands, without a caution, even strictly', () => {
    const { status, stdout } = plumbtick(['new', '--out', 'first.json']);
    expect(status).toBe(0);
    expect(stdout).toBe('Wrote first.json. Next: plumbtick predict first.json\n');
    expect(JSON.parse(plumbtick(['check', 'first.json', '--strict', '--json']).stdout)).toEqual({
      faults: [],
      warnings: [],
    });
    const { links } = JSON.parse(plumbtick(['predict', 'first.json', '--json']).stdout) as {
      links: { y: { value: number; u: number } }[];
    };
    expect(links).toHaveLength(1);
    expect(links[0]!.y.value).toBeGreaterThan(2.5e-14); // the observatory is some 240 m higher
    expect(links[0]!.y.value).toBeLessThan(2.7e-14);
  });

  it('explains itself: every object of the first level down to the clocks carries a note somewhere', () => {
    const { stdout } = plumbtick(['new']);
    const campaign = JSON.parse(stdout) as Record<string, unknown>;
    for (const key of ['sources', 'sites', 'clocks', 'links'])
      expect(JSON.stringify(campaign[key])).toContain('"note"');
    expect(campaign['note']).toContain('plumbtick check');
  });

  it('leaves a file alone unless told to replace it, and says so', () => {
    const name = file('mine.json', 'mine');
    const refused = plumbtick(['new', '--out', name]);
    expect(refused.status).toBe(2);
    expect(refused.stderr).toContain('mine.json exists and was left alone');
    expect(readFileSync(path.join(folder, name), 'utf8')).toBe('mine');
    const replaced = plumbtick(['new', '--out', name, '--overwrite']);
    expect(replaced).toMatchObject({ status: 0, stdout: 'Replaced mine.json. Next: plumbtick predict mine.json\n' });
    expect(readFileSync(path.join(folder, name), 'utf8')).toContain('plumbtick-campaign/1');
  });

  it('says why it cannot write', () => {
    const { status, stderr } = plumbtick(['new', '--out', 'no/such/folder.json']);
    expect(status).toBe(2);
    expect(stderr).toContain('there is no such folder');
    expect(existsSync(path.join(folder, 'no'))).toBe(false);
  });
});

describe('floors and pair, without a file', () => {
  it('floors: g·Δ and the gradient, one offset per transition; contract keys in SI', () => {
    const args = [
      'floors',
      '--dH',
      '12.348(3) m',
      '--g',
      '9.8125(1) m/s²',
      '--transition',
      '87Sr',
      '--transition',
      '171Yb',
    ];
    const { status, stdout } = plumbtick([...args, '--json']);
    expect(status).toBe(0);
    const answer = JSON.parse(stdout) as {
      dW: { value: number; u: number };
      y: { value: number; u: number };
      dH: { value: number; u: number };
      offsetHz: Record<string, { value: number }>;
    };
    // in 30-digit decimals: 9.8125·12.348 − ½·3.086e-6·12.348² m²/s², over c² = 299792458²
    expect(Math.abs(answer.dW.value - 121.164514734000528)).toBeLessThan(1e-10);
    expect(Math.abs(answer.y.value - 1.34813704110495e-15)).toBeLessThan(1e-24);
    expect(answer.dH).toEqual({ value: 12.348, u: 0.003 });
    expect(Object.keys(answer.offsetHz)).toEqual(['87Sr', '171Yb']);
    const people = plumbtick(args);
    expect(people.stdout).toContain('The clock above runs fast by 1.34814(33)e-15.');
    expect(people.stdout).toContain('+12.3480(30)');
    expect(people.stdout).toContain('\u22121348.14(33)'); // the correction is the negative of the shift
  });

  it('floors takes a negative height difference behind its option: the clock runs slow', () => {
    const { status, stdout } = plumbtick(['floors', '--dH', '-3.21(1) m', '--lat', '-33.9', '--height', '80 m']);
    expect(status).toBe(0);
    expect(stdout).toContain('The clock below runs slow by 3.499(11)e-16');
  });

  it('pair: the higher site runs fast, and swapping the sites turns the sign', async () => {
    const site = (id: string, [lat, h, zeta]: readonly [string, string, string]) =>
      [`--${id}-lat`, lat, `--${id}-lon`, '11', `--${id}-h`, h, `--${id}-zeta`, zeta] as const;
    const low = ['52.3', '143.216(8) m', '43.812(19) m'] as const;
    const high = ['50.9', '384.907(9) m', '45.733(20) m'] as const;
    const y = async (first: typeof low | typeof high, second: typeof low | typeof high) => {
      const { status, stdout } = await called(['pair', ...site('a', first), ...site('b', second), '--json']);
      expect(status).toBe(0);
      return (JSON.parse(stdout) as { y: { value: number; u: number } }).y;
    };
    const up = await y(low, high);
    const down = await y(high, low);
    expect(up.value).toBeGreaterThan(2.6e-14);
    expect(up.value + down.value).toBe(0);
    expect(Math.abs(up.u - down.u)).toBeLessThan(1e-30);
  });

  it('pair says every missing option at once', async () => {
    const { status, stderr } = await called(['pair', '--a-lat', '95']);
    expect(status).toBe(2);
    for (const option of ['--a-lat 95', '--a-lon', '--a-h', '--a-zeta', '--b-lat', '--b-lon', '--b-h', '--b-zeta'])
      expect(stderr).toContain(option);
  });
});

describe('check', () => {
  const unlabelled = {
    format: 'plumbtick-campaign/1',
    sites: [
      {
        id: 'a',
        lat: 52,
        lon: 10,
        g: 9.8125,
        h: '143.216(8) m',
        determinations: [{ kind: 'gnss-quasigeoid', zeta: { value: '43.812(19) m', tide: 'zero' } }],
      },
    ],
  };

  it('prints an empty list of faults and the warnings of a good file', () => {
    const { status, stdout } = plumbtick(['check', example('three-sites.json'), '--json']);
    expect(status).toBe(0);
    const answer = JSON.parse(stdout) as { faults: unknown[]; warnings: { code: string }[] };
    expect(Object.keys(answer)).toEqual(['faults', 'warnings']);
    expect(answer.faults).toEqual([]);
    expect(answer.warnings.map(({ code }) => code)).toContain('combined-outside');
    expect(plumbtick(['check', example('three-sites.json')]).stdout).toMatch(
      /^Can be used: 3 sites, 3 clocks, 3 links, 2 measurements; 1 caution\.\n/,
    );
  });

  it('--strict refuses a height without a tide label at its line; else it is a caution with its size', () => {
    const text = JSON.stringify(unlabelled, null, 1);
    const lenient = plumbtick(['check', '-', '--json'], text);
    expect(lenient.status).toBe(0);
    expect(JSON.parse(lenient.stdout)).toMatchObject({ faults: [], warnings: [{ code: 'tide-label-missing' }] });
    const strict = plumbtick(['check', '-', '--strict', '--json'], text);
    expect(strict.status).toBe(1);
    const line = text.split('\n').findIndex((l) => l.includes('"h"')) + 1;
    expect(JSON.parse(strict.stdout)).toMatchObject({
      faults: [{ code: 'tide-label-missing', path: 'sites.a.h', line }],
      warnings: [],
    });
  });

  it('counts cautions beyond the thirtieth, and faults beyond the fiftieth', () => {
    const many = (more: object) => ({
      format: 'plumbtick-campaign/1',
      sites: Array.from({ length: 80 }, (_, i) => ({ id: `s${i}`, lat: 50, lon: 10, ...more })),
    });
    const unleveled = plumbtick(['check', '-'], JSON.stringify(many({ g: 9.81 }))); // no determination anywhere
    expect(unleveled.status).toBe(0);
    expect(unleveled.stdout.match(/^Caution: sites\./gm)).toHaveLength(30);
    expect(unleveled.stdout).toContain('Caution: 50 more like these; --json lists all of them');
    const wrong = plumbtick(['check', '-'], JSON.stringify(many({ colour: 'red' })));
    expect(wrong.status).toBe(1);
    expect(wrong.stdout.match(/\[unknown-key\]/g)).toHaveLength(50);
    expect(wrong.stdout).toContain('and 30 more; --json lists all of them');
  });

  it('prints faults on standard output for people, with file, line and column', () => {
    const name = file('wrong.json', '{\n "format": "plumbtick-campaign/1",\n "sites": [],\n "targett": "1 cm"\n}\n');
    const { status, stdout } = plumbtick(['check', name]);
    expect(status).toBe(1);
    expect(stdout).toContain('Refused: one fault in wrong.json');
    expect(stdout).toMatch(/wrong\.json:4:\d+: targett \[unknown-key\]/);
    expect(stdout).toContain('target');
  });
});
