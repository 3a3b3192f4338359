import { describe, expect, it } from 'vitest';
import { example, plumbtick } from './run-cli.js';

interface MonteCarlo {
  trials: number;
  seed: number;
  mean: number;
  u: number;
  interval95: [number, number];
  validated: boolean;
}
interface Links {
  links: { id: string; y: { value: number; u: number }; monteCarlo?: MonteCarlo }[];
}

const file = example('triangle.json');
const linksOf = (stdout: string) => (JSON.parse(stdout) as Links).links;

describe('predict --monte-carlo', () => {
  const { status, stdout, stderr } = plumbtick(['predict', file, '--json', '--monte-carlo', '50_000', '--seed', '12']);

  it('adds trials, mean, u, interval95 and validated to every link', () => {
    expect([status, stderr]).toEqual([0, '']);
    for (const { y, monteCarlo } of linksOf(stdout)) {
      expect(monteCarlo).toMatchObject({ trials: 50_000, seed: 12, validated: true });
      const { mean, u, interval95 } = monteCarlo!;
      expect(Math.abs(mean - y.value)).toBeLessThan((5 * y.u) / Math.sqrt(50_000));
      expect(Math.abs(u / y.u - 1)).toBeLessThan(5 / Math.sqrt(100_000));
      expect(Math.abs(interval95[0] - (y.value - 1.96 * y.u))).toBeLessThan(0.06 * y.u);
      expect(Math.abs(interval95[1] - (y.value + 1.96 * y.u))).toBeLessThan(0.06 * y.u);
    }
  });

  it('gives the same for the same seed, another for another, and nothing of it without the option', () => {
    const again = plumbtick(['predict', file, '--json', '--monte-carlo', '5e4', '--seed', '12']);
    expect(again.stdout).toBe(stdout);
    const other = plumbtick(['predict', file, '--json', '--monte-carlo', '50000', '--seed', '13']);
    expect(linksOf(other.stdout)[0]!.monteCarlo!.mean).not.toBe(linksOf(stdout)[0]!.monteCarlo!.mean);
    expect(linksOf(plumbtick(['predict', file, '--json']).stdout)[0]).not.toHaveProperty('monteCarlo');
  });

  it('takes auto, and prints a table that says whether the linear result holds', () => {
    const { status: done, stdout: text } = plumbtick(['predict', file, '--monte-carlo', 'auto']);
    expect(done).toBe(0);
    expect(text).toMatch(/Monte Carlo: y by trials/);
    expect(text).toMatch(/\d+\u00a0000 trials, seed 1\./);
    for (const { id } of linksOf(stdout)) expect(text).toMatch(new RegExp(`${id}.+holds`));
    const csv = plumbtick(['predict', file, '--monte-carlo', '20000', '--csv', '--table', 'monte-carlo']);
    expect(csv.status).toBe(0);
    expect(csv.stdout.split('\n')[0]).toContain('linear result');
  });

  it('warns in words where the linear result does not hold', () => {
    const text = JSON.stringify({
      format: 'plumbtick-campaign/1',
      sites: [
        {
          id: 'a',
          lat: 50,
          lon: 10,
          g: 9.81,
          determinations: [{ kind: 'potential', W: { value: '62636000.0(5)', distribution: 'uniform' } }],
        },
        { id: 'b', lat: 50, lon: 11, g: 9.81, determinations: [{ kind: 'potential', W: '62635000.000(1)' }] },
      ],
      clocks: ['a', 'b'].map((id) => ({ id: `c-${id}`, site: id, transition: '87Sr' })),
      links: [{ id: 'ab', from: 'c-a', to: 'c-b' }],
    });
    const { stdout: json } = plumbtick(['predict', '-', '--json', '--monte-carlo', '100000'], text);
    const answer = JSON.parse(json) as Links & { warnings: { code: string; message: string }[] };
    expect(answer.links[0]!.monteCarlo!.validated).toBe(false);
    expect(answer.warnings.find((w) => w.code === 'linear-not-validated')!.message).toContain('does not hold');
  });

  it('refuses other words with status 2, and says what would be right', () => {
    for (const [words, expected] of [
      [['--monte-carlo', 'many'], 'expected a whole number from 100 to 100000000, or auto'],
      [['--monte-carlo', '10'], 'expected a whole number from 100'],
      [['--monte-carlo', '1e9'], 'expected a whole number from 100'],
      [['--monte-carlo', '1000.5'], 'expected a whole number from 100'],
      [['--seed', '3'], '--seed goes with --monte-carlo'],
      [['--monte-carlo', '1000', '--seed', '-4'], 'expected a whole number from 0'],
      [['--monte-carlo', '1000', '--seed', 'x'], 'expected a whole number from 0'],
    ] as const) {
      const run = plumbtick(['predict', file, ...words]);
      expect([run.status, run.stdout]).toEqual([2, '']);
      expect(run.stderr).toContain(expected);
    }
  });
});
