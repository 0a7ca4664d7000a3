import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import { useTitle } from '../parts/use-title';

/** The address names no page. */
export function NotHere() {
  useTitle('Not here');
  return (
    <section class="empty">
      <h1>There is no page at this address</h1>
      <p>It may be mistyped, or a line or effect may have been renamed. <Link href={pages.today}>Today</Link> shows everything that exists now.</p>
    </section>
  );
}
