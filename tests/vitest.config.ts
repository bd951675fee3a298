import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('..', import.meta.url));
const project = (name: string, timeout: number, parallel = true) => ({
  resolve: { alias: { '@': `${root}src` } },
  test: {
    name,
    root,
    include: [`tests/${name}/**/*.test.{ts,tsx}`],
    testTimeout: timeout,
    hookTimeout: 120_000,
    fileParallelism: parallel,
    // A hostile zone: a time that leans on the machine's zone shows at once.
    env: { TZ: 'Asia/Kathmandu' },
  },
});

export default defineConfig({
  test: {
    projects: [
      project('unit', 20_000),
      project('reference', 120_000),
      project('api', 60_000, false),
      project('faults', 180_000, false),
      project('e2e', 240_000, false),
    ],
  },
});
