// The REST interface with invented data, for work on the dashboard alone. `--built` serves dist under the service's content security policy;
// `--empty` has no readings; `--calm` has no notices; `--down-after N` stops answering after N seconds.
// PORT (5180) serves three lines, the next port forty, the one after that a single line, the fourth lines that run in every way.
import { createReadStream, existsSync, statSync } from 'node:fs';
import { createServer } from 'node:http';
import { extname, join, normalize } from 'node:path';
import { fileURLToPath } from 'node:url';
import { effectOf, lineOf } from './answers.mjs';
import { campaignsOf, cleaningOf, cleaningsOf } from './fouling.mjs';
import { notices, signals, sources } from './intake.mjs';
import { cleanings, plantText, sizes, start } from './plant.mjs';
import { trend } from './series.mjs';
import { differences, recomputations, revisions } from './revisions.mjs';
import { everyWay, sheetOf } from './sheets.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
const option = name => process.argv.includes(name);
const port = Number(process.env.PORT ?? 5180), begun = Date.now(), empty = option('--empty'), calm = option('--calm');
const downAfter = option('--down-after') ? Number(process.argv[process.argv.indexOf('--down-after') + 1]) * 1000 : Infinity;
const now = () => start + Date.now() - begun;
const iso = t => new Date(t).toISOString();
const total = 18_423_100, rate = 41_000;
let cancelled = false, listeners = [], sent = 0;
const keys = new Map();

function running() {
  const read = Math.min(total, 0.43 * total + (Date.now() - begun) * 5);
  const state = cancelled ? 'cancelled' : read >= total ? 'done' : 'running';
  return { id: 'sha256-1', name: 'north-2025.csv.gz', state, bytes_total: total, bytes_read: read, rows: 12_000, accepted: 2_704_113, repeated: 40, differing: 1, rejected: 3, not_in_plant: 20,
    rows_per_s: rate, seconds_left: (total - read) / 5000, started_at: iso(start - 90_000), ended_at: state === 'running' ? null : iso(now()), error: null,
    problems: [{ line: 17, reason: "value 'n/a' is not a number" }, { line: 90, reason: 'time 2026-03-29 02:30 did not exist in Europe/Copenhagen' }], unknown_signals: [{ name: 'X.1', count: 20 }] };
}
const failed = { ...running(), id: 'sha256-0', name: 'south.csv', state: 'failed', bytes_total: 9400, bytes_read: 120, accepted: 0, rejected: 0, error: 'line 1: the header has no column time', problems: [], unknown_signals: [], ended_at: iso(start - 86_000_000), started_at: iso(start - 86_010_000) };
const site = () => ({ name: 'Fennholm', time_zone: 'Europe/Copenhagen', now: iso(now()), latest_reading_at: empty ? null : iso(now() - 3000), readings: empty ? 'none' : 'live', plant_revision: 3, window_s: 300,
  imports_running: empty || cancelled ? 0 : 1, days_waiting: empty ? 0 : Math.max(0, 12 - Math.floor((Date.now() - begun) / 20_000)), notices: empty || calm ? [] : notices });

const json = (response, status, body, type = 'application/json') => { response.writeHead(status, { 'content-type': type }); response.end(JSON.stringify(body)); };
const problem = (response, status, title, detail) => json(response, status, { status, title, detail }, 'application/problem+json');
const body = request => new Promise(resolve => { let text = ''; request.on('data', d => { if (text.length < 1e6) text += d; }); request.on('end', () => resolve(text)); });

async function answer(request, response, url) {
  const path = url.pathname.replace('/api/v1', '').split('/').filter(Boolean).map(decodeURIComponent), q = url.searchParams;
  const plant = [sizes.few, sizes.many, sizes.one, everyWay][request.socket.localPort - port];
  const line = plant.find(l => l.name === path[1]), effect = line?.effects.find(e => e.name === path[3]);
  switch (path[0]) {
    case 'site': return json(response, 200, site());
    case 'lines':
      if (path.length === 1) return json(response, 200, { lines: empty ? [] : plant.map(l => lineOf(l, now())) });
      if (!line) return problem(response, 404, 'Not found', `There is no line ${path[1]}.`);
      if (path.length === 2) return json(response, 200, lineOf(line, now()));
      if (path[2] === 'flow-sheet') return json(response, 200, sheetOf(line, now()));
      if (!effect) return problem(response, 404, 'Not found', `Line ${line.name} has no effect ${path[3]}.`);
      if (path.length === 4) return json(response, 200, effectOf(line, effect));
      if (path[4] === 'campaigns') return json(response, 200, campaignsOf(plant, line, effect));
      return answerTrend(request, response, trend(line, effect, q.get('quantity'), Date.parse(q.get('from')), Date.parse(q.get('to')), Number(q.get('points') ?? 2000)));
    case 'cleanings': return answerCleanings(request, response, path, q, plant);
    case 'signals': return json(response, 200, empty ? { as_of: iso(now()), signals: [], unknown: [] } : signals(plant, now()));
    case 'sources': return json(response, 200, empty ? { sources: [], spool: { bytes: 0 }, refused: [] } : sources(now()));
    case 'recomputations': return json(response, 200, { recomputations });
    case 'plant':
      if (path[3] === 'differences') return json(response, 200, differences);
      if (path[1] === 'revisions') return json(response, 200, { revisions });
      return json(response, 200, { revision: 3, accepted_at: '2026-10-02T08:11:00Z', in_force_from: '2026-10-01T00:00:00Z', author: 'k.olm', text: plantText });
    case 'imports':
      if (path[2] === 'cancel') { cancelled = true; return json(response, 202, running()); }
      if (request.method === 'POST') { await body(request); return json(response, 202, { ...running(), id: `sha256-${Date.now()}`, name: q.get('name'), state: 'done' }); }
      return json(response, 200, { imports: empty ? [] : [running(), failed] });
    case 'events':
      response.writeHead(200, { 'content-type': 'text/event-stream', 'cache-control': 'no-cache' });
      if (q.has('last_event_id') || request.headers['last-event-id']) response.write(`id: ${++sent}\nevent: reset\ndata: {}\n\n`);
      response.write(`id: ${++sent}\nevent: site\ndata: ${JSON.stringify(site())}\n\n`);
      listeners.push(response);
      return request.on('close', () => { listeners = listeners.filter(l => l !== response); });
    default: return problem(response, 404, 'Not found', 'No such resource.');
  }
}

function answerTrend(request, response, t) {
  if (!request.headers.accept?.includes('text/csv')) return json(response, 200, t);
  response.writeHead(200, { 'content-type': 'text/csv' });
  response.end(`time,value,u\n${t.offset_s.map((o, i) => `${iso(Date.parse(t.start) + o * 1000)},${t.value[i] ?? ''},${t.u[i] ?? ''}`).join('\n')}\n`);
}

async function answerCleanings(request, response, path, q, plant) {
  if (request.method === 'DELETE') { cleanings.splice(cleanings.findIndex(c => c.id === path[1]), 1); response.writeHead(204); return response.end(); }
  if (request.method === 'POST' || request.method === 'PUT') {
    const wanted = JSON.parse(await body(request)), key = request.headers['idempotency-key'], old = request.method === 'PUT' ? path[1] : null;
    if (keys.has(key)) return json(response, 200, keys.get(key));
    const logged = cleanings.filter(c => c.id !== old && !['c-N4-1', 'c-B1-1'].includes(c.id));
    const other = logged.find(c => c.effect === wanted.effect && c.start < (wanted.end ?? '9') && (c.end ?? '9') > wanted.start);
    if (other) return problem(response, 409, 'Overlap', `${wanted.effect} was being cleaned from ${other.start} to ${other.end ?? 'now'}`);
    const made = { ...wanted, id: old ?? `c-${cleanings.length}`, logged_at: iso(now()) };
    if (old !== null) cleanings.splice(cleanings.findIndex(c => c.id === old), 1);
    cleanings.push(made);
    keys.set(key, cleaningOf(made));
    return json(response, old === null ? 201 : 200, cleaningOf(made));
  }
  return json(response, 200, { cleanings: empty ? [] : cleaningsOf(plant, q.get('line'), q.get('effect')) });
}

setInterval(() => { for (const l of listeners) l.write(`id: ${++sent}\nevent: import\ndata: ${JSON.stringify(running())}\n\nid: ${++sent}\nevent: site\ndata: ${JSON.stringify(site())}\n\n`); }, 2000);

const types = { '.html': 'text/html; charset=utf-8', '.js': 'text/javascript', '.css': 'text/css', '.svg': 'image/svg+xml', '.woff2': 'font/woff2' };
function built(request, response, url) {
  const asked = join(root, 'dist', normalize(url.pathname));
  const file = existsSync(asked) && statSync(asked).isFile() ? asked : join(root, 'dist', 'index.html');
  response.writeHead(200, { 'content-type': types[extname(file)] ?? 'application/octet-stream', 'content-security-policy': "default-src 'self'; frame-ancestors 'none'; base-uri 'none'" });
  createReadStream(file).pipe(response);
}

const vite = option('--built') ? null : await (await import('vite')).createServer({ root, appType: 'spa', server: { middlewareMode: true } });
const serve = (request, response) => {
  const url = new URL(request.url, 'http://localhost');
  if (Date.now() - begun > downAfter && url.pathname.startsWith('/api')) { listeners.forEach(l => l.destroy()); return request.destroy(); }
  if (url.pathname.startsWith('/api/')) return void answer(request, response, url);
  return vite ? vite.middlewares(request, response) : built(request, response, url);
};
for (const at of [port, port + 1, port + 2, port + 3]) createServer(serve).listen(at, '127.0.0.1');
console.log(`http://127.0.0.1:${port}/ with invented data${vite ? '' : ', built'}; forty lines on ${port + 1}, one on ${port + 2}, every way to run on ${port + 3}`);
setInterval(() => { if (Date.now() - begun > downAfter) { listeners.forEach(l => l.destroy()); listeners = []; } }, 500);
