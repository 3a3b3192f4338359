import { afterEach, describe, expect, it, vi } from 'vitest';
import type { Command } from '../../lib/cli/command.js';

// A fault of the program itself can't be had from outside, or it would be mended: a command that breaks stands in for it.
const broken = (name: string, run: Command['run']): Command => ({
  name,
  summary: '',
  synopsis: '',
  description: [],
  examples: [],
  takesFile: false,
  options: {},
  run,
});
vi.mock('../../lib/cli/commands/index.js', () => ({
  commands: [
    broken('throws', () => {
      throw new TypeError('cannot read h of undefined\n    at somewhere (file.ts:1:1)');
    }),
    broken('nan', () => ({
      kind: 'answer',
      status: 0,
      json: { links: [{ y: { value: Number.NaN } }] },
      report: () => {
        throw new Error('not asked for');
      },
    })),
    broken('text', () => {
      throw 'a text'; // not even an error
    }),
  ],
}));
const { main } = await import('../../lib/cli/main.js');

async function run(...words: string[]) {
  let stdout = '';
  let stderr = '';
  vi.spyOn(process.stdout, 'write').mockImplementation((text) => {
    stdout += String(text);
    return true;
  });
  vi.spyOn(process.stderr, 'write').mockImplementation((text) => {
    stderr += String(text);
    return true;
  });
  const status = await main(words);
  vi.restoreAllMocks();
  return { status, stdout, stderr };
}
afterEach(() => vi.restoreAllMocks());

describe('an error of the program itself', () => {
  it('is one line with a code and where to report it, exit status 1, no stack', async () => {
    const { status, stdout, stderr } = await run('throws');
    expect([status, stdout]).toEqual([1, '']);
    expect(stderr.trimEnd().split('\n')).toHaveLength(1);
    expect(stderr).toContain('internal error [TypeError: cannot read h of undefined]');
    expect(stderr).toContain('please open an issue');
    expect(stderr).not.toContain('somewhere');
    expect((await run('text')).stderr).toContain('a text');
  });

  it('is a fault with --json', async () => {
    const { status, stdout, stderr } = await run('throws', '--json');
    expect([status, stderr]).toEqual([1, '']);
    expect(JSON.parse(stdout)).toMatchObject({ faults: [{ code: 'internal-error', line: null, path: '' }] });
  });

  it('never lets a NaN out as a null', async () => {
    const { status, stdout } = await run('nan', '--json');
    expect(status).toBe(1);
    expect(JSON.parse(stdout)).toMatchObject({
      faults: [{ code: 'internal-error', found: 'RangeError: value is NaN' }],
    });
  });
});
