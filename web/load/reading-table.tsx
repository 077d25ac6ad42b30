import type { ChannelName } from '../../server/shapes/channel';
import type { Upload } from '../../server/shapes/load';
import type { ColumnReading, FileReading } from '../../server/shapes/reading';
import { Scroll } from '../scroll';
import { channelChoices } from './channel-choices';

/** The first rows in the file's own words, above the program's reading of them; each column's meaning and unit can be changed. */
export function ReadingTable({ looked, onChange }: { looked: Upload; onChange: (reading: FileReading) => void }) {
  const { reading, preview } = looked;
  const width = Math.max(
    0,
    ...preview.map((row) => row.words.length),
    ...reading.columns.map((column) => column.index + 1),
  );
  const columns = Array.from(
    { length: width },
    (_, index) => reading.columns.find((column) => column.index === index) ?? null,
  );
  const put = (index: number, change: Partial<ColumnReading>) =>
    onChange({
      ...reading,
      columns: reading.columns.map((column) => (column.index === index ? { ...column, ...change } : column)),
    });
  return (
    <Scroll label={`How ${looked.file} is read`}>
      <table class="reading">
        <thead>
          <tr>
            <th scope="row">heading</th>
            {columns.map((column, index) => (
              <th scope="col" key={index}>
                {column?.label || (reading.time.columns.includes(index) ? 'time' : `column ${index + 1}`)}
              </th>
            ))}
          </tr>
          <tr>
            <th scope="row">read as</th>
            {columns.map((column, index) => (
              <td key={index}>
                {reading.time.columns.includes(index) ? (
                  <b>time</b>
                ) : column === null ? (
                  'not read'
                ) : (
                  <Meaning column={column} onPut={(change) => put(index, change)} />
                )}
              </td>
            ))}
          </tr>
        </thead>
        {preview.slice(0, 6).map((row) => (
          <tbody key={row.line}>
            <tr class="words">
              <th scope="row">line {row.line}</th>
              {columns.map((_, index) => (
                <td key={index}>{row.words[index] ?? ''}</td>
              ))}
            </tr>
            <tr class="understood">
              <th scope="row">read</th>
              {columns.map((column, index) => (
                <td key={index}>
                  {row.refused !== null && reading.time.columns[0] === index ? (
                    <em>{row.refused}</em>
                  ) : reading.time.columns[0] === index ? (
                    (row.at?.replace('T', ' ').replace(/(:\d\d)\.000Z$/, '$1 UTC') ?? '')
                  ) : (
                    understood(column, row.values, reading)
                  )}
                </td>
              ))}
            </tr>
          </tbody>
        ))}
      </table>
    </Scroll>
  );
}

function understood(column: ColumnReading | null, values: (number | null)[], reading: FileReading): string {
  if (column === null || column.channel === null) return '';
  const value = values[reading.columns.indexOf(column)];
  return value == null ? 'missing' : `${value} ${column.unit === null || column.unit === 'count' ? '' : column.unit}`;
}

function Meaning({ column, onPut }: { column: ColumnReading; onPut: (change: Partial<ColumnReading>) => void }) {
  const units = column.channel === null ? [] : channelChoices[column.channel].units;
  const name = column.label || `column ${column.index + 1}`;
  return (
    <>
      <select
        aria-label={`What ${name} measures`}
        value={column.channel ?? ''}
        onChange={(event) =>
          onPut({
            channel: event.currentTarget.value === '' ? null : (event.currentTarget.value as ChannelName),
            unit: null,
          })
        }
      >
        <option value="">not read</option>
        {Object.entries(channelChoices).map(([channel, { words }]) => (
          <option key={channel} value={channel}>
            {words}
          </option>
        ))}
      </select>
      {column.channel !== null && (
        <select
          aria-label={`Unit of ${name}`}
          value={column.unit ?? ''}
          onChange={(event) => onPut({ unit: event.currentTarget.value === '' ? null : event.currentTarget.value })}
        >
          <option value="">the sensor's unit</option>
          {column.unit !== null && !units.includes(column.unit) && <option value={column.unit}>{column.unit}</option>}
          {units.map((unit) => (
            <option key={unit} value={unit}>
              {unit}
            </option>
          ))}
        </select>
      )}
    </>
  );
}
