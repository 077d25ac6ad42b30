import { useState } from 'preact/hooks';
import type { RamDetail } from '../../server/shapes/ram';
import { api, type BurstView } from '../api';
import { Shown, useAsked } from '../asked';
import { instant } from '../dates';
import { shownNumber } from '../numbers';

export function Bursts({ ram }: { ram: RamDetail }) {
  const [open, setOpen] = useState<number | null>(null);
  return (
    <section aria-labelledby="bursts-title">
      <h2 id="bursts-title">Bursts</h2>
      <ul class="plain">
        {ram.bursts.map((burst) => (
          <li key={burst.burst_id}>
            <button
              type="button"
              aria-expanded={open === burst.burst_id}
              onClick={() => setOpen(open === burst.burst_id ? null : burst.burst_id)}
            >
              {instant(burst.at, ram.installation.time_zone)}:{' '}
              {burst.beats_per_min === null
                ? 'no beats found'
                : `${shownNumber(burst.beats_per_min, 2)} beats a minute`}{' '}
              over {Math.round(burst.seconds)} s
            </button>
            {open === burst.burst_id && <OneBurst id={burst.burst_id} />}
          </li>
        ))}
      </ul>
    </section>
  );
}

function OneBurst({ id }: { id: number }) {
  const asked = useAsked(String(id), () => api.burst(id));
  return <Shown asked={asked}>{(burst) => <Trace burst={burst} />}</Shown>;
}

/** The trace with each closing of the waste valve marked below it. */
function Trace({ burst: { beats, trace } }: { burst: BurstView }) {
  const [width, height] = [1000, 220];
  const values = [...trace.min, ...trace.max].filter((v): v is number => v !== null);
  const low = Math.min(0, ...values);
  const high = Math.max(...values);
  const x = (at: number) => (at / beats.seconds) * width;
  const y = (value: number) => height - 24 - ((value - low) / (high - low || 1)) * (height - 34);
  const up = trace.at_s
    .map((at, i) =>
      trace.max[i] === null ? '' : `${i === 0 ? 'M' : 'L'}${x(at).toFixed(1)} ${y(trace.max[i]!).toFixed(1)}`,
    )
    .join('');
  const down = trace.at_s
    .map((_, i) => i)
    .reverse()
    .map((i) => (trace.min[i] === null ? '' : `L${x(trace.at_s[i]!).toFixed(1)} ${y(trace.min[i]!).toFixed(1)}`))
    .join('');
  const rate = beats.beats_per_min;
  return (
    <figure class="trace">
      <svg
        viewBox={`0 0 ${width} ${height}`}
        role="img"
        aria-label={`Pressure over ${Math.round(beats.seconds)} seconds with ${beats.beats.length} beats marked.`}
      >
        <path d={`${up}${down}Z`} class="line" />
        {beats.beats.map((beat) => (
          <path
            key={beat.closed_at_s}
            d={`M${x(beat.closed_at_s)} ${height - 18} V${height - 4}`}
            class={beat.doubtful ? 'beat doubtful' : 'beat'}
          />
        ))}
      </svg>
      <figcaption>
        {trace.channel.replaceAll('_', ' ')}, {Math.round(low)} to {Math.round(high)} {trace.unit}; a tick below for
        each closing of the waste valve (dashed where in doubt). {beats.beats.length} beats
        {rate === null ? '' : `, ${rate.value.toFixed(2)} a minute (${rate.low.toFixed(2)} to ${rate.high.toFixed(2)})`}
        . {beats.notes.join(' ')}
      </figcaption>
    </figure>
  );
}
