import { signal } from '@preact/signals';

/** The page asked for, from the address after #. */
export type Place =
  | { page: 'rounds' }
  | { page: 'ram'; key: string }
  | { page: 'load'; key: string | null }
  | { page: 'receipt'; load: number }
  | { page: 'new' }
  | { page: 'visit'; key: string }
  | { page: 'nowhere' };

export function placeOf(hash: string): Place {
  const [page = '', rest] = hash.replace(/^#\/?/, '').split('/');
  const key = rest === undefined || rest === '' ? null : decodeURIComponent(rest);
  if (page === '') return { page: 'rounds' };
  if (page === 'ram' && key !== null) return { page: 'ram', key };
  if (page === 'load') return { page: 'load', key };
  if (page === 'receipt' && key !== null && /^\d+$/.test(key)) return { page: 'receipt', load: Number(key) };
  if (page === 'new') return { page: 'new' };
  if (page === 'visit' && key !== null) return { page: 'visit', key };
  return { page: 'nowhere' };
}

export const place = signal<Place>(placeOf(location.hash));

window.addEventListener('hashchange', () => {
  place.value = placeOf(location.hash);
  window.scrollTo(0, 0);
  // a new page is announced by its heading
  requestAnimationFrame(() => document.querySelector<HTMLElement>('h1')?.focus());
});

export const ramAddress = (key: string): string => `#/ram/${encodeURIComponent(key)}`;
