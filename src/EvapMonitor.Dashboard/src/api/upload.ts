import { addresses } from './addresses';
import { describe, RequestFailure } from './request';
import type { Import, Problem } from './types';

/** Sends a file of readings as it is. XMLHttpRequest, because fetch cannot tell how much of a body is sent. */
export function upload(file: File, sent: (share: number) => void, signal: AbortSignal): Promise<Import> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open('POST', addresses.upload(file.name));
    request.setRequestHeader('content-type', /\.gz$/i.test(file.name) ? 'application/gzip' : 'text/csv');
    request.setRequestHeader('accept', 'application/json');
    request.responseType = 'json';
    request.upload.onprogress = event => { if (event.lengthComputable && event.total > 0) sent(event.loaded / event.total); };
    request.onload = () => {
      if (request.status >= 200 && request.status < 300) resolve(request.response as Import);
      else reject(new RequestFailure(describe(request.response as Problem | null, request.status), request.status < 500, request.status));
    };
    request.onerror = () => reject(new RequestFailure('the service does not answer', false, null));
    request.onabort = () => reject(new DOMException('stopped', 'AbortError'));
    signal.addEventListener('abort', () => request.abort());
    request.send(file);
  });
}
