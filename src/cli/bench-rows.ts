/**
 * `tsx src/cli/bench-rows.ts <file> <answer>`: measures the rows of one file of tests/bench and
 * writes them as JSON to the answer file, so that what a row prints does not get among them.
 */
import { writeFileSync } from 'node:fs';
import { pathToFileURL } from 'node:url';

const [file = '', answer = ''] = process.argv.slice(2);
const { rows } = (await import(pathToFileURL(file).href)) as { rows(): Promise<unknown[]> };
writeFileSync(answer, JSON.stringify(await rows()));
process.exit(0);
