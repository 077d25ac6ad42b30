import { useState } from 'preact/hooks';
import { api } from '../api';
import { LongSection } from '../ram/long-section';
import { ramAddress } from '../router';
import { Sheet } from '../sheet';
import { drawable, emptyRam, installationOf, type RamEntry, sensorChoices, tankFields, tankShapes } from './ram-entry';

/** A ram's installation, entered field by field with the drawing following, or pasted as JSON. */
export function NewRamPage() {
  const [entry, setEntry] = useState<RamEntry>(emptyRam());
  const [pasted, setPasted] = useState('');
  const [why, setWhy] = useState<string | null>(null);
  const put = (change: Partial<RamEntry>) => setEntry((before) => ({ ...before, ...change }));
  const add = (installation: unknown) =>
    api.addRam(installation).then(
      ({ key }) => {
        location.hash = ramAddress(key);
      },
      (error: Error) => setWhy(error.message),
    );
  const field = (
    name: keyof RamEntry & string,
    label: string,
    mode: 'decimal' | 'text' = 'decimal',
    required = false,
  ) => (
    <label>
      {label}
      <input
        required={required}
        inputMode={mode}
        value={entry[name] as string}
        onInput={(event) => put({ [name]: event.currentTarget.value })}
      />
    </label>
  );
  const shown = drawable(entry);
  return (
    <Sheet title="Add a ram">
      <form
        class="entry"
        onSubmit={(event) => {
          event.preventDefault();
          void add(installationOf(entry));
        }}
      >
        <p>Heights are measured from the waste valve outlet.</p>
        <div class="fields">
          {field('name', 'Name', 'text', true)}
          {field('time_zone', 'Time zone', 'text', true)}
          {field('fall_m', 'Fall, m', 'decimal', true)}
          {field('lift_m', 'Lift, m', 'decimal', true)}
          {field('drive_length_m', 'Drive pipe, length m', 'decimal', true)}
          {field('drive_bore_mm', 'Drive pipe, bore mm', 'decimal', true)}
          <label>
            Drive pipe, material
            <select
              value={entry.drive_material}
              onChange={(event) => put({ drive_material: event.currentTarget.value })}
            >
              {['', 'steel', 'ductile iron', 'cast iron', 'copper', 'PVC-U', 'HDPE', 'concrete'].map((material) => (
                <option key={material} value={material}>
                  {material === '' ? 'not known' : material}
                </option>
              ))}
            </select>
          </label>
          {field('delivery_length_m', 'Delivery pipe, length m')}
          {field('delivery_bore_mm', 'Delivery pipe, bore mm')}
          {field('people_served', 'People served')}
          {field('floor_l_per_day', 'Least delivery that is enough, L/day')}
        </div>
        <fieldset>
          <legend>Tank</legend>
          <div class="fields">
            <label>
              Shape
              <select
                value={entry.tank_shape}
                onChange={(event) => put({ tank_shape: event.currentTarget.value as RamEntry['tank_shape'] })}
              >
                {tankShapes.map((shape) => (
                  <option key={shape} value={shape}>
                    {shape === '' ? 'none, or not known' : shape}
                  </option>
                ))}
              </select>
            </label>
            {tankFields[entry.tank_shape].map(({ name, label }) => (
              <label key={name}>
                {label}
                <input
                  inputMode="decimal"
                  value={entry.tank[name] ?? ''}
                  onInput={(event) => put({ tank: { ...entry.tank, [name]: event.currentTarget.value } })}
                />
              </label>
            ))}
          </div>
        </fieldset>
        <fieldset>
          <legend>Sensors of the logger</legend>
          <div class="ticks">
            {sensorChoices.map(({ channel, label }) => (
              <label key={channel}>
                <input
                  type="checkbox"
                  checked={entry.sensors.includes(channel)}
                  onChange={(event) =>
                    put({
                      sensors: event.currentTarget.checked
                        ? [...entry.sensors, channel]
                        : entry.sensors.filter((one) => one !== channel),
                    })
                  }
                />{' '}
                {label}
              </label>
            ))}
          </div>
          {entry.sensors.includes('source_level') && (
            <div class="fields">
              {field('source_zero_m', 'Gauge zero of the source level above the waste valve outlet, m')}
            </div>
          )}
          {entry.sensors.includes('chamber_pressure') && (
            <div class="fields">{field('chamber_gauge_m', 'Chamber sensor above the waste valve outlet, m')}</div>
          )}
        </fieldset>
        {shown !== null && <LongSection installation={shown} latest={null} />}
        {why !== null && (
          <p class="refused" role="alert">
            {why}
          </p>
        )}
        <p>
          <button type="submit" class="main">
            Add this ram
          </button>
        </p>
      </form>
      <details>
        <summary>Paste a description as JSON instead</summary>
        <p>
          Every field is listed in the <a href="/api/installation-schema">JSON Schema</a>.
        </p>
        <textarea
          class="json"
          rows={10}
          aria-label="Description of the ram as JSON"
          value={pasted}
          onInput={(event) => setPasted(event.currentTarget.value)}
        />
        <p>
          <button
            type="button"
            onClick={() => {
              try {
                void add(JSON.parse(pasted));
              } catch (error) {
                setWhy(`This is not JSON: ${(error as Error).message}.`);
              }
            }}
          >
            Add from JSON
          </button>
        </p>
      </details>
    </Sheet>
  );
}
