/** Files on their way to the shop: three at a time, each with its progress, its refusal, its retry. */
import type { photoRoutes, PhotoView, Upload } from '@/contracts/photos';
import {
  kindByBytes,
  refuseKind,
  refuseSize,
  typeOfKind,
  type PhotoPhase,
  type PhotoSide,
} from '@/domain/photos/files';
import { ask, newKey, type Refused } from '../shared/ask';
import { sendFile } from './send-file';

type Routes = typeof photoRoutes;

export type UploadState = 'waiting' | 'sending' | 'checking' | 'failed' | 'refused';
export type UploadRow = {
  id: number;
  name: string;
  state: UploadState;
  /** Share that has gone, 0 to 1. */
  share: number;
  /** Why it failed (it can be tried again) or was refused (it cannot). */
  sentence: string;
};

type Item = UploadRow & {
  file: File;
  side: PhotoSide;
  phase: PhotoPhase;
  key: string;
  upload: Upload | null;
  /** The file lies in the store; only the checking is left. */
  put: boolean;
  stop: AbortController;
};

export type UploadQueue = ReturnType<typeof uploadQueue>;

const AT_ONCE = 3;
const PATIENCE = 5;

/** What a person can mend by trying again; everything else is said once. */
const passes = ({ status }: Refused) =>
  status === 0 || status === 401 || status === 429 || status >= 500;

const pause = (seconds: number) => new Promise((go) => setTimeout(go, seconds * 1000));

/** @param onChange told the rows after every change. @param onReady told each photo that is ready. */
export function uploadQueue(
  ticketNumber: string,
  onChange: (rows: UploadRow[]) => void,
  onReady: (photo: PhotoView) => void,
) {
  let items: Item[] = [];
  let next = 1;
  const tell = () => onChange(items.map((item) => ({ ...item })));
  const set = (item: Item, change: Partial<Item>) => {
    Object.assign(item, change);
    tell();
  };
  const drop = (item: Item) => {
    items = items.filter((other) => other !== item);
    tell();
  };
  const settle = (item: Item, state: 'failed' | 'refused', sentence: string) =>
    set(item, { state, sentence });
  const settleRefusal = (item: Item, refusal: Refused) =>
    settle(item, passes(refusal) ? 'failed' : 'refused', refusal.sentence);

  /** Promises the upload; the type is that of the content, because browsers go by the name. */
  async function begin(item: Item): Promise<boolean> {
    const { file, side, phase, key } = item;
    const head = await file
      .slice(0, 256)
      .arrayBuffer()
      .catch(() => null);
    if (!head) {
      settle(item, 'failed', 'The file cannot be read any more: choose it again.');
      return false;
    }
    const kind = kindByBytes(new Uint8Array(head));
    const why = refuseSize(file.size) ?? refuseKind(kind);
    if (why) {
      settle(item, 'refused', why);
      return false;
    }
    const fileName = file.name.slice(-200) || 'photo';
    const begun = await ask<Routes['begin']>({
      method: 'POST',
      path: `/api/tickets/${ticketNumber}/photos`,
      body: { fileName, type: typeOfKind(kind) ?? '', bytes: file.size, side, phase },
      key,
      signal: item.stop.signal,
    });
    if (begun.ok) item.upload = begun.value;
    else settleRefusal(item, begun);
    return begun.ok;
  }

  async function send(item: Item, upload: Upload): Promise<boolean> {
    const onSent = (share: number) => set(item, { share });
    const sent = await sendFile(upload, item.file, onSent, item.stop.signal);
    item.put = sent.ok;
    if (sent.ok) return true;
    // The address has run out: the next try begins anew.
    if (sent.status === 403) Object.assign(item, { upload: null, key: newKey() });
    settle(item, 'failed', sent.sentence);
    return false;
  }

  async function check(item: Item, upload: Upload): Promise<void> {
    set(item, { state: 'checking', share: 1 });
    for (let tries = 1; ; tries++) {
      const done = await ask<Routes['done']>({
        method: 'POST',
        path: `/api/photos/${upload.photo}/done`,
        signal: item.stop.signal,
      });
      if (done.ok) {
        drop(item);
        onReady(done.value);
        return;
      }
      if (done.status === 503 && tries < PATIENCE) await pause(done.retryAfter ?? 2);
      else {
        // A row that is gone, or a file that did not arrive, needs a new upload.
        if (done.status === 404 || done.status === 409)
          Object.assign(item, { upload: null, put: false, key: newKey() });
        return settleRefusal(item, done);
      }
      if (item.stop.signal.aborted) return;
    }
  }

  async function run(item: Item): Promise<void> {
    set(item, { state: 'sending', sentence: '', share: item.put ? 1 : 0 });
    try {
      if (!item.upload && !(await begin(item))) return;
      if (!item.upload) return;
      if (!item.put && !(await send(item, item.upload))) return;
      await check(item, item.upload);
    } catch (error) {
      if (!item.stop.signal.aborted) throw error;
    } finally {
      pump();
    }
  }

  function pump(): void {
    const busy = items.filter(({ state }) => state === 'sending' || state === 'checking').length;
    const waiting = items.filter(({ state }) => state === 'waiting');
    for (const item of waiting.slice(0, Math.max(0, AT_ONCE - busy))) void run(item);
  }

  return {
    add(files: readonly File[], side: PhotoSide, phase: PhotoPhase): void {
      const added = files.map((file): Item => {
        const rest = { upload: null, put: false, stop: new AbortController(), key: newKey() };
        const row = {
          id: next++,
          name: file.name,
          state: 'waiting',
          share: 0,
          sentence: '',
        } as const;
        return { ...row, ...rest, file, side, phase };
      });
      items = [...items, ...added];
      tell();
      pump();
    },
    retry(id: number): void {
      const item = items.find((other) => other.id === id && other.state === 'failed');
      if (!item) return;
      set(item, { state: 'waiting', sentence: '' });
      pump();
    },
    /** Calls an upload off, or takes a settled row out of sight. */
    remove(id: number): void {
      const item = items.find((other) => other.id === id);
      if (!item) return;
      item.stop.abort();
      drop(item);
      if (item.upload && item.state !== 'refused') {
        const { photo, version } = item.upload;
        // What cannot be called off now is swept by the server.
        void ask<Routes['remove']>({ method: 'DELETE', path: `/api/photos/${photo}`, version });
      }
      pump();
    },
  };
}
