import { signal } from '@preact/signals';

/** Where the cursor stands on every chart of the page: s since 1970, or nowhere. */
export const cursorAt = signal<number | null>(null);
