// `npm run bench`: what Meterwright costs beside doing the same without it. `--json` prints JSON alone.
import { nodeComplaint } from './parts/node-version.mjs';

const complaint = nodeComplaint();
if (complaint) {
  console.error(complaint);
  process.exit(1);
}
import('./parts/bench-run.mjs')
  .then(({ runBench }) => runBench({ json: process.argv.includes('--json') }))
  .then((code) => process.exit(code));
