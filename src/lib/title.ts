import { useEffect } from 'react';

/** The document's title: what this page is, then the product. */
export function useTitle(what: string): void {
  useEffect(() => {
    document.title = `${what} · Fringeward`;
  }, [what]);
}
