import { useEffect } from 'react';

/** Names the page in the browser's tab and history. */
export function useDocumentTitle(title: string): void {
  useEffect(() => {
    document.title = title === 'Faintward' ? title : `${title} · Faintward`;
  }, [title]);
}
