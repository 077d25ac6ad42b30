import type { ComponentChildren } from 'preact';

/** A page's heading and body; the title of the window follows. */
export function Sheet({ title, children }: { title: string; children: ComponentChildren }) {
  document.title = `${title} · Clackwatch`;
  return (
    <>
      <h1 tabIndex={-1}>{title}</h1>
      {children}
    </>
  );
}
