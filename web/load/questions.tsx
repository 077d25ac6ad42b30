import type { Upload } from '../../server/shapes/load';
import type { FileReading, ReadingQuestion } from '../../server/shapes/reading';

/** What the file itself cannot decide, asked plainly. */
export function Questions({ looked, onChange }: { looked: Upload; onChange: (reading: FileReading) => void }) {
  if (looked.questions.length === 0) return null;
  return (
    <ul class="questions">
      {looked.questions.map((question) => (
        <li key={question.question} class={question.must_answer ? 'must' : ''}>
          <p>{question.question}</p>
          <p>
            {question.choices.slice(0, 6).map(({ label, value }) => (
              <button type="button" key={value} onClick={() => onChange(answered(looked.reading, question, value))}>
                {label}
              </button>
            ))}
          </p>
          {question.about === 'start of burst' && (
            <label>
              Start of the burst (UTC){' '}
              <input
                type="datetime-local"
                step="1"
                onChange={(event) =>
                  onChange(answered(looked.reading, question, `${event.currentTarget.value.padEnd(19, ':00')}Z`))
                }
              />
            </label>
          )}
        </li>
      ))}
    </ul>
  );
}

/** The reading with a question's answer put in its place. */
function answered(reading: FileReading, question: ReadingQuestion, value: string): FileReading {
  switch (question.about) {
    case 'day order':
      return { ...reading, time: { ...reading.time, day_order: value as FileReading['time']['day_order'] } };
    case 'time zone':
      return { ...reading, time: { ...reading.time, zone: value } };
    case 'start of burst':
      return { ...reading, time: { ...reading.time, start_at: value } };
    case 'unit':
      return {
        ...reading,
        columns: reading.columns.map((column) =>
          column.index === question.column ? { ...column, unit: value } : column,
        ),
      };
    default:
      return {
        ...reading,
        columns: reading.columns.map((column) =>
          column.index === question.column ? { ...column, channel: value === '' ? null : (value as never) } : column,
        ),
      };
  }
}
