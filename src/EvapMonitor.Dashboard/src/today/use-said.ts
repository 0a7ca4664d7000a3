import { useEffect, useRef } from 'preact/hooks';
import { announce } from '../parts/Announcer';
import type { Piece } from '../words/line';

/** Says a line's new state aloud; that a duration in it grows is not said. */
export function useSaid(line: string, pieces: Piece[]): void {
  const text = pieces.map(p => p.text).join('');
  const state = text.replace(/\d+/g, '');
  const before = useRef(state);
  useEffect(() => {
    if (before.current !== state) announce(`${line}: ${text}`);
    before.current = state;
  }, [state]);
}
