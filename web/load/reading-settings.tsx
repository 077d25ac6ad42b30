import type { FileReading } from '../../server/shapes/reading';

const delimiters: [FileReading['delimiter'], string][] = [
  [',', 'comma'],
  [';', 'semicolon'],
  ['\t', 'tab'],
  ['|', 'upright bar'],
  [' ', 'blanks'],
];

/** The rest of a reading: how the text is cut and how its clock is meant. */
export function ReadingSettings({
  reading,
  onChange,
}: {
  reading: FileReading;
  onChange: (reading: FileReading) => void;
}) {
  const time = (change: Partial<FileReading['time']>) => onChange({ ...reading, time: { ...reading.time, ...change } });
  return (
    <details class="settings">
      <summary>Dates, clock and text</summary>
      <div class="fields">
        <label>
          Order of the date
          <select
            value={reading.time.day_order ?? ''}
            disabled={reading.time.form !== 'fields'}
            onChange={(event) => time({ day_order: event.currentTarget.value as FileReading['time']['day_order'] })}
          >
            <option value="" disabled>
              not decided
            </option>
            <option value="day first">day first</option>
            <option value="month first">month first</option>
            <option value="year first">year first</option>
          </select>
        </label>
        <label>
          Clock of the logger
          <input
            list="clocks"
            value={reading.time.zone}
            onChange={(event) => time({ zone: event.currentTarget.value.trim() })}
          />
          <datalist id="clocks">
            <option value="ram">the ram's local time</option>
            <option value="utc">UTC</option>
            <option value="+03:00" />
          </datalist>
        </label>
        <label>
          A stamp marks
          <select
            value={reading.time.stamp_marks}
            onChange={(event) => time({ stamp_marks: event.currentTarget.value as 'end' | 'start' })}
          >
            <option value="end">the end of its interval</option>
            <option value="start">the start of its interval</option>
          </select>
        </label>
        <label>
          Columns are divided by
          <select
            value={reading.delimiter}
            onChange={(event) =>
              onChange({ ...reading, delimiter: event.currentTarget.value as FileReading['delimiter'] })
            }
          >
            {delimiters.map(([value, words]) => (
              <option key={words} value={value}>
                {words}
              </option>
            ))}
          </select>
        </label>
        <label>
          Decimal mark
          <select
            value={reading.decimal_mark}
            onChange={(event) => onChange({ ...reading, decimal_mark: event.currentTarget.value as '.' | ',' })}
          >
            <option value=".">point</option>
            <option value=",">comma</option>
          </select>
        </label>
        <label>
          First line of records
          <input
            type="number"
            min={1}
            value={reading.first_record_line}
            onChange={(event) =>
              onChange({ ...reading, first_record_line: Math.max(1, Number(event.currentTarget.value)) })
            }
          />
        </label>
      </div>
    </details>
  );
}
