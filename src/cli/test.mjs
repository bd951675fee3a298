// `npm test`: every check and test, its last line `N passed, N failed`. `-- --only unit,api` for some.
import { nodeComplaint } from './parts/node-version.mjs';

const complaint = nodeComplaint();
if (complaint) {
  console.error(complaint);
  console.log('0 passed, 1 failed');
  process.exit(1);
}
import('./parts/test-run.mjs')
  .then(({ runTests }) => runTests())
  .then((code) => process.exit(code));
