import { useState } from 'preact/hooks';
import type { VisitAction } from '../../server/shapes/visit';
import { api } from '../api';
import { ramAddress } from '../router';
import { Sheet } from '../sheet';
import { type BucketEntry, emptyBucket, litresPerSecond, visitOf } from './visit-entry';

const actions: VisitAction[] = [
  'cleaned strainer',
  'cleaned intake',
  'flushed drive pipe',
  'repaired drive pipe',
  'replaced waste valve rubber',
  'adjusted stroke',
  'replaced delivery valve rubber',
  'recharged air chamber',
  'cleared snifter',
  'cleared delivery pipe',
  'repaired delivery pipe',
  'tightened bolts',
  'restarted',
  'stopped on purpose',
  'replaced logger battery',
  'set logger clock',
  'zeroed sensor',
  'other',
];

/** A visit as it is entered at the ram: bucket tests, counted beats, what was done. */
export function VisitPage({ ram }: { ram: string }) {
  const [when, setWhen] = useState(localNow());
  const [who, setWho] = useState('');
  const [delivery, setDelivery] = useState<BucketEntry>(emptyBucket);
  const [waste, setWaste] = useState<BucketEntry>(emptyBucket);
  const [beats, setBeats] = useState('');
  const [beatSeconds, setBeatSeconds] = useState('60');
  const [fall, setFall] = useState('');
  const [done, setDone] = useState<VisitAction[]>([]);
  const [note, setNote] = useState('');
  const [why, setWhy] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const keep = (event: Event) => {
    event.preventDefault();
    setBusy(true);
    api.addVisit(ram, visitOf({ when, who, delivery, waste, beats, beatSeconds, fall, done, note })).then(
      () => {
        location.hash = ramAddress(ram);
      },
      (error: Error) => {
        setWhy(error.message);
        setBusy(false);
      },
    );
  };
  return (
    <Sheet title="Enter a visit">
      <form class="entry" onSubmit={keep}>
        <div class="fields">
          <label>
            When, by the ram's clock
            <input
              type="datetime-local"
              required
              value={when}
              onInput={(event) => setWhen(event.currentTarget.value)}
            />
          </label>
          <label>
            Who
            <input value={who} maxLength={80} onInput={(event) => setWho(event.currentTarget.value)} />
          </label>
          <label>
            Fall measured, m
            <input inputMode="decimal" value={fall} onInput={(event) => setFall(event.currentTarget.value)} />
          </label>
        </div>
        <Bucket title="Bucket test of the delivery" entry={delivery} onChange={setDelivery} />
        <Bucket title="Bucket test of the waste" entry={waste} onChange={setWaste} />
        <fieldset>
          <legend>Beats counted</legend>
          <div class="fields">
            <label>
              Beats
              <input inputMode="numeric" value={beats} onInput={(event) => setBeats(event.currentTarget.value)} />
            </label>
            <label>
              in seconds
              <input
                inputMode="decimal"
                value={beatSeconds}
                onInput={(event) => setBeatSeconds(event.currentTarget.value)}
              />
            </label>
          </div>
        </fieldset>
        <fieldset>
          <legend>What was done</legend>
          <div class="ticks">
            {actions.map((action) => (
              <label key={action}>
                <input
                  type="checkbox"
                  checked={done.includes(action)}
                  onChange={(event) =>
                    setDone(event.currentTarget.checked ? [...done, action] : done.filter((one) => one !== action))
                  }
                />{' '}
                {action}
              </label>
            ))}
          </div>
          <p class="faded">Adjusting the stroke makes it another ram: its set-up span begins anew.</p>
        </fieldset>
        <label>
          Note
          <textarea rows={3} maxLength={4000} value={note} onInput={(event) => setNote(event.currentTarget.value)} />
        </label>
        {why !== null && (
          <p class="refused" role="alert">
            {why}
          </p>
        )}
        <p>
          <button type="submit" class="main" disabled={busy}>
            Keep this visit
          </button>{' '}
          <a class="button" href={ramAddress(ram)}>
            Back to the ram
          </a>
        </p>
      </form>
    </Sheet>
  );
}

function Bucket({
  title,
  entry,
  onChange,
}: {
  title: string;
  entry: BucketEntry;
  onChange: (entry: BucketEntry) => void;
}) {
  const flow = litresPerSecond(entry);
  return (
    <fieldset>
      <legend>{title}</legend>
      <div class="fields">
        <label>
          Litres
          <input
            inputMode="decimal"
            value={entry.litres}
            onInput={(event) => onChange({ ...entry, litres: event.currentTarget.value })}
          />
        </label>
        {entry.seconds.map((value, i) => (
          <label key={i}>
            {['First', 'Second', 'Third'][i]} filling, s
            <input
              inputMode="decimal"
              value={value}
              onInput={(event) =>
                onChange({
                  ...entry,
                  seconds: entry.seconds.map((one, k) => (k === i ? event.currentTarget.value : one)),
                })
              }
            />
          </label>
        ))}
      </div>
      <p aria-live="polite">
        {flow === null ? (
          <span class="faded">Litres a second come out here.</span>
        ) : (
          <b>
            {flow.toFixed(3)} L/s, {Math.round((flow * 86_400) / 10) * 10} L a day
          </b>
        )}
      </p>
    </fieldset>
  );
}

function localNow(): string {
  const now = new Date();
  return new Date(now.getTime() - now.getTimezoneOffset() * 60_000).toISOString().slice(0, 16);
}
