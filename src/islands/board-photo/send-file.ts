/** Puts a file at its promised address. XMLHttpRequest, because fetch does not tell how much has gone. */
import type { Upload } from '@/contracts/photos';

export type Sent = { ok: true } | { ok: false; status: number; sentence: string };

/** @param onSent told the share that has gone, 0 to 1. @throws DOMException AbortError when `signal` was aborted */
export function sendFile(
  upload: Upload,
  file: File,
  onSent: (share: number) => void,
  signal: AbortSignal,
): Promise<Sent> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    const stop = () => request.abort();
    const end = (sent: Sent) => {
      signal.removeEventListener('abort', stop);
      resolve(sent);
    };
    request.upload.onprogress = (event) => {
      if (event.lengthComputable) onSent(event.loaded / event.total);
    };
    request.onload = () => {
      const { status } = request;
      if (status >= 200 && status < 300) end({ ok: true });
      else if (status === 403)
        end({ ok: false, status, sentence: 'The upload took too long to begin: try again.' });
      else
        end({ ok: false, status, sentence: 'The photo store did not take the file: try again.' });
    };
    request.onerror = () =>
      end({
        ok: false,
        status: 0,
        sentence: 'The connection broke off while the file was sent: try again.',
      });
    request.onabort = () => reject(new DOMException('Upload cancelled', 'AbortError'));
    if (signal.aborted) return request.onabort(new ProgressEvent('abort'));
    signal.addEventListener('abort', stop);
    request.open('PUT', upload.url);
    for (const [name, value] of Object.entries(upload.headers))
      request.setRequestHeader(name, value);
    request.send(file);
  });
}
