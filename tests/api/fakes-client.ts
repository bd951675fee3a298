import { spawn, spawnSync, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdtemp, rm } from 'node:fs/promises';
import { request } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { S3Client, type S3ClientConfig } from '@aws-sdk/client-s3';
import { onTestFinished } from 'vitest';

process.env['AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED'] = 'true';

export const account = { key: 'AKBENCH', secret: 'a-secret-for-the-bench' };
export const bucket = 'photos';

/** A temporary folder, removed by the function returned. */
export async function temporaryFolder(): Promise<{ path: string; remove: () => Promise<void> }> {
  const path = await mkdtemp(join(tmpdir(), 'fakes-'));
  return { path, remove: () => rm(path, { recursive: true, force: true }) };
}

/** A client of the store; one attempt, so that a test sees each refusal. */
export function client(port: number, more: S3ClientConfig = {}): S3Client {
  return new S3Client({
    endpoint: `http://127.0.0.1:${port}`,
    region: 'us-east-1',
    forcePathStyle: true,
    credentials: { accessKeyId: account.key, secretAccessKey: account.secret },
    maxAttempts: 1,
    ...more,
  });
}

/** The settings the shop uses. */
export const lean: S3ClientConfig = {
  requestChecksumCalculation: 'WHEN_REQUIRED',
  responseChecksumValidation: 'WHEN_REQUIRED',
};

/** The code a call was refused with, or `done`. */
export async function codeOf(call: Promise<unknown>): Promise<string> {
  try {
    await call;
    return 'done';
  } catch (error) {
    return error instanceof Error ? error.name : String(error);
  }
}

export interface RawAnswer {
  status: number;
  headers: Record<string, string | string[] | undefined>;
  body: string;
}

/** A request sent exactly as given: path and headers are not touched. */
export function raw(
  port: number,
  method: string,
  path: string,
  headers: Record<string, string> = {},
  body: Buffer | string = '',
): Promise<RawAnswer> {
  return new Promise((resolve, reject) => {
    const sent = request({ host: '127.0.0.1', port, method, path, headers }, (answer) => {
      const pieces: Buffer[] = [];
      answer.on('data', (piece: Buffer) => pieces.push(piece));
      answer.on('error', reject);
      answer.on('end', () => {
        const text = Buffer.concat(pieces).toString('utf8');
        resolve({ status: answer.statusCode ?? 0, headers: answer.headers, body: text });
      });
    });
    sent.on('error', reject);
    sent.end(body);
  });
}

/** The code in an error document. */
export const xmlCode = ({ body }: RawAnswer): string => /<Code>(\w+)/.exec(body)?.[1] ?? 'none';

/** JSON from a control port or the inbox. */
export async function json<T>(url: string, method = 'GET', body?: unknown): Promise<T> {
  const answer = await fetch(url, {
    method,
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
  });
  if (!answer.ok) throw new Error(`${answer.status}: ${await answer.text()}`);
  return (await answer.json()) as T;
}

/** A server started from the command line, with the line it printed when ready. */
export async function command(
  script: string,
  args: readonly string[],
  env: Record<string, string> = {},
): Promise<{ child: ChildProcess; ready: string }> {
  const child = spawn(process.execPath, ['--import', 'tsx', script, ...args], {
    stdio: ['ignore', 'pipe', 'inherit'],
    env: { ...process.env, ...env },
  });
  onTestFinished(() => {
    child.kill('SIGKILL');
  });
  const [first] = (await once(child.stdout, 'data')) as [Buffer];
  return { child, ready: first.toString('utf8').trim() };
}

/** A start that is expected to fail: its exit code and what it printed. */
export function refusedStart(
  script: string,
  args: readonly string[],
): { code: number | null; printed: string } {
  const { status, stderr } = spawnSync(process.execPath, ['--import', 'tsx', script, ...args], {
    encoding: 'utf8',
  });
  return { code: status, printed: stderr };
}

/** Ends a child and returns its exit code, null when the signal ended it. */
export async function end(child: ChildProcess, signal: NodeJS.Signals): Promise<number | null> {
  const closed = once(child, 'exit') as Promise<[number | null]>;
  child.kill(signal);
  return (await closed)[0];
}
