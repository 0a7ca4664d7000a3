import type { Piece } from '../words/line';

/** Sentences with their bold clause. */
export function Words({ pieces }: { pieces: Piece[] }) {
  return <p class="say">{pieces.map(p => (p.bold ? <b>{p.text}</b> : p.text))}</p>;
}
