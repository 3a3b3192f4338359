import { expect, vi } from 'vitest';
import { main } from '../../lib/cli/main.js';

/** The same words without a process of their own, for the many cases that only differ in them. */
export async function called(args: readonly string[]): Promise<{ status: number; stdout: string; stderr: string }> {
  let stdout = '';
  let stderr = '';
  const outSpy = vi.spyOn(process.stdout, 'write').mockImplementation((text) => {
    stdout += String(text);
    return true;
  });
  const errSpy = vi.spyOn(process.stderr, 'write').mockImplementation((text) => {
    stderr += String(text);
    return true;
  });
  try {
    const status = await main(args);
    expect(stdout + stderr).not.toMatch(/internal.error/);
    return { status, stdout, stderr };
  } finally {
    outSpy.mockRestore();
    errSpy.mockRestore();
  }
}
