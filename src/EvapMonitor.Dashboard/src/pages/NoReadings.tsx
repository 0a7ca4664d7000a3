import { Upload } from '../parts/Upload';

/** Nothing has come yet: what to do, and the means to do it. */
export function NoReadings() {
  return (
    <section class="empty" aria-labelledby="no-readings">
      <h2 id="no-readings">No reading has come yet</h2>
      <p class="say">Nothing can be computed before the first readings. <b>Bring in the site's history here</b>, or let the plant's readings flow in.</p>
      <p>A file is CSV with a header: one reading a row (<code>time,signal,value</code>, and <code>quality</code> where there is one), or one
        column per signal (<code>time</code>, then the names). Times are RFC 3339 or the site's local time. It may be gzipped. Signals are those that the plant file names.</p>
      <Upload />
    </section>
  );
}
