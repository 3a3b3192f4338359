import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, expect } from 'vitest';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** A folder of this test file's own, gone when it is done; with the bundled command line in it. */
export const folder = mkdtempSync(path.join(tmpdir(), 'plumbtick-cli-'));
const cliFile = path.join(folder, 'cli', 'cli.mjs');
execFileSync(process.execPath, ['scripts/build.mjs', '--cli', cliFile], { cwd: root });
afterAll(() => rmSync(folder, { recursive: true, force: true }));

export interface Run {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
  /** processor time, all of the program's: what does not depend on who else uses the machine */
  readonly cpuSeconds: number;
}

/** Loaded before the program: writes down its processor time when it ends. */
const meterFile = path.join(folder, 'cli', 'seconds');
const meter = `data:text/javascript,${encodeURIComponent(
  "import fs from 'node:fs'; process.on('exit', () => { const { user, system } = process.cpuUsage(); fs.writeFileSync(process.env.METER_FILE, String((user + system) / 1e6)); });",
)}`;

/** A line of a stack trace, in any of the forms that Node prints. */
const STACK_LINE = /^\s+at .+(:\d+:\d+\)?|\(<anonymous>\)|native)$|node:internal|Node\.js v\d/m;

/** Runs the command line as a user would. Whatever it meets, it must not end in a stack trace or by a signal. */
export function plumbtick(args: readonly string[], input: string | Uint8Array = ''): Run {
  const { status, stdout, stderr } = spawnSync(process.execPath, ['--import', meter, cliFile, ...args], {
    input,
    env: { ...process.env, METER_FILE: meterFile },
    cwd: folder,
    encoding: 'utf8',
    maxBuffer: 256 * 2 ** 20,
    timeout: 60_000,
  });
  const cpuSeconds = Number(readFileSync(meterFile, 'utf8'));
  expect(stderr).not.toMatch(STACK_LINE);
  expect(stdout).not.toMatch(STACK_LINE);
  expect(stderr).not.toContain('internal error');
  expect(stdout).not.toContain('internal-error');
  expect([0, 1, 2]).toContain(status);
  return { status, stdout, stderr, cpuSeconds };
}

/** Writes a campaign (or any text) into the test's folder. @returns its name, relative to the folder */
export function file(name: string, content: unknown): string {
  const text = typeof content === 'string' || content instanceof Uint8Array ? content : JSON.stringify(content);
  writeFileSync(path.join(folder, name), text);
  return name;
}

export const example = (name: string): string => path.join(root, 'test', 'data', 'examples', name);

export interface CliFault {
  readonly code: string;
  readonly path: string;
  readonly line: number | null;
  readonly column: number | null;
  readonly found: string;
  readonly expected: string;
}

/** The faults of a refused file, from `--json`; every one complete. */
export function faultsOf({ status, stdout }: Pick<Run, 'status' | 'stdout'>): readonly CliFault[] {
  expect(status).toBe(1);
  const { faults } = JSON.parse(stdout) as { faults: readonly CliFault[] };
  expect(faults.length).toBeGreaterThan(0);
  for (const fault of faults) {
    expect(Object.keys(fault).sort()).toEqual(['code', 'column', 'expected', 'found', 'line', 'path']);
    expect(fault.code).toMatch(/^[a-z0-9-]+$/);
    expect(fault.expected).not.toBe('');
  }
  return faults;
}
