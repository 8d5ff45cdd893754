import { useEffect } from 'react';

const PRODUCT = 'Groundsel';

/**
 * Sets the tab's title: "Accuracy · Isle of Vennory · Groundsel", with "42 % · " in front while work goes on.
 *
 * @param parts page first, then project; empty ones are left out
 * @param progress share done 0–1 of the work this page watches, or null
 */
export function useTitle(parts: (string | null | undefined)[], progress: number | null = null): void {
  const text = titleOf(parts, progress);
  useEffect(() => {
    document.title = text;
  }, [text]);
}

/** The title useTitle sets. */
export function titleOf(parts: (string | null | undefined)[], progress: number | null = null): string {
  const words = [...parts.filter(Boolean), PRODUCT];
  if (progress !== null) words.unshift(`${Math.floor(progress * 100)} %`);
  return words.join(' · ');
}
