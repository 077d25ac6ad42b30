import type { Condition } from '../server/shapes/finding';

/**
 * A ram's condition as a flap over its pipe, in word, shape and colour: seated, lifting, hanging open, dropped over a dry pipe,
 * or not to be seen.
 */
const flaps: Record<Condition, string> = {
  holding: 'M5 17 H23',
  slipping: 'M5 17 L22 12',
  failing: 'M5 17 L17 4',
  stopped: 'M5 17 H23 M8 21 L20 27 M20 21 L8 27',
  'no word': '',
};

export function ConditionMark({ condition }: { condition: Condition }) {
  return (
    <span class={`condition ${condition.replace(' ', '-')}`}>
      <svg viewBox="0 0 28 28" width="28" height="28" aria-hidden="true">
        {condition === 'no word' ? (
          <circle cx="14" cy="15" r="8" fill="none" stroke="currentColor" stroke-width="2" stroke-dasharray="3 3" />
        ) : (
          <>
            <path d="M9 20 V27 M19 20 V27 M4 20 H24" fill="none" stroke="currentColor" stroke-width="1.6" />
            <path d={flaps[condition]} fill="none" stroke="currentColor" stroke-width="4" stroke-linecap="round" />
            <circle cx="5" cy="17" r="2.4" fill="currentColor" />
          </>
        )}
      </svg>
      <span>{condition}</span>
    </span>
  );
}
