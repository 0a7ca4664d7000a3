import type { ComponentChildren } from 'preact';
import { useErrorBoundary } from 'preact/hooks';

/** Keeps a fault in one page from taking the frame with it, and says what to do. */
export function Boundary({ children }: { children: ComponentChildren }) {
  const [error] = useErrorBoundary();
  if (error === undefined) return <>{children}</>;
  return (
    <section class="empty" role="alert">
      <h1>This page met something that it cannot show</h1>
      <p>The service and its results are not touched. <b>Load the page again</b>; if it comes back, tell whoever looks after the service: {String(error)}</p>
      <p><button type="button" onClick={() => location.reload()}>Load again</button></p>
    </section>
  );
}
