import type { ComponentChildren } from 'preact';

/** Something wider than a phone: it scrolls by itself, also by keyboard, and says what it is. */
export function Scroll({
  label,
  tall = false,
  children,
}: {
  label: string;
  tall?: boolean;
  children: ComponentChildren;
}) {
  return (
    <section class={tall ? 'scroll tall' : 'scroll'} tabIndex={0} aria-label={label}>
      {children}
    </section>
  );
}
