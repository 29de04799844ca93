import type { MouseEvent } from 'react';

/** Follows a link in place, unless it was meant for a new tab or window. */
export const followed =
  (go: () => void) =>
  (event: MouseEvent<HTMLAnchorElement>): void => {
    if (event.metaKey || event.ctrlKey || event.shiftKey || event.altKey || event.button !== 0) return;
    event.preventDefault();
    go();
  };
