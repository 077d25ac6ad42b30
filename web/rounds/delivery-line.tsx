import { linePath } from './line-path';

/** Sixty days of delivery as a line, for a glance; told in words for those who do not see it. */
export function DeliveryLine({ values, name }: { values: (number | null)[]; name: string }) {
  const known = values.filter((value): value is number => value !== null);
  if (known.length < 2) return null;
  const top = Math.max(...known) * 1.08;
  const last = known.at(-1)!;
  const words = `Delivery of ${name} over sixty days: from ${Math.round(known[0]!)} to ${Math.round(last)} litres a day.`;
  return (
    <figure class="delivery-line">
      <svg viewBox="0 0 180 44" role="img" aria-label={words} preserveAspectRatio="none">
        <path d="M0 43.5 H180" class="base" />
        <path d={linePath(values, 180, 44, top)} class="line" />
      </svg>
      <figcaption>60 days, from 0</figcaption>
    </figure>
  );
}
