// `npm start`: from a fresh checkout to the open demo shop. `--dev` serves from the sources.
import { nodeComplaint } from './parts/node-version.mjs';

const complaint = nodeComplaint();
if (complaint) {
  console.error(complaint);
  process.exit(1);
}
import('./parts/open-shop.mjs')
  .then(({ openShop }) => openShop({ dev: process.argv.includes('--dev') }))
  .then((code) => process.exit(code));
