import { readFileSync } from 'node:fs';
import { defineConfig } from 'vitest/config';

const { version } = JSON.parse(readFileSync(new URL('package.json', import.meta.url), 'utf8')) as { version: string };

export default defineConfig({
  define: { __PLUMBTICK_VERSION__: JSON.stringify(version) },
  test: {
    include: ['test/{lib,published,cli,pages}/**/*.test.ts'],
    testTimeout: 60_000,
    hookTimeout: 120_000,
    coverage: { provider: 'v8', include: ['lib/**/*.ts'] },
  },
});
