import { signal } from '@preact/signals';
import type { Condition } from '../../server/shapes/finding';
import type { Rounds, RoundsRow } from '../../server/shapes/ram';
import { api } from '../api';
import { Shown, useAsked } from '../asked';
import { ConditionMark } from '../condition-mark';
import { day, since } from '../dates';
import { share, shownFigure, shownNumber } from '../numbers';
import { Pair } from '../pair';
import { ramAddress } from '../router';
import { Sheet } from '../sheet';
import { DeliveryLine } from './delivery-line';

const conditions: Condition[] = ['stopped', 'failing', 'slipping', 'no word', 'holding'];
const only = signal<Condition | null>(null);

export function RoundsPage() {
  const asked = useAsked('rounds', api.rounds);
  return (
    <Sheet title="Rounds">
      <Shown asked={asked}>{(rounds) => <RoundsList rounds={rounds} />}</Shown>
    </Sheet>
  );
}

function RoundsList({ rounds }: { rounds: Rounds }) {
  if (rounds.rows.length === 0) return <Empty />;
  const rows = rounds.rows.filter((row) => only.value === null || row.condition === only.value);
  return (
    <>
      {rounds.demonstration && (
        <p class="demonstration">
          This is the demonstration valley: invented rams, whose calendar stands at {day(rounds.as_of)}. Your own rams
          live apart from it: start with <code>npm start -- --empty</code>.
        </p>
      )}
      <p class="lead">{headline(rounds.rows)}</p>
      <Filter rows={rounds.rows} />
      <ol class="rounds">
        {rows.map((row, i) => (
          <Row key={row.key} row={row} place={i + 1} />
        ))}
      </ol>
    </>
  );
}

function headline(rows: RoundsRow[]): string {
  const wanting = rows.filter((row) => row.finding !== null || row.condition === 'stopped');
  const lost = rows.reduce((sum, row) => sum + (row.litres_lost_per_day ?? 0), 0);
  if (wanting.length === 0) return `${rows.length} rams; none asks for a visit.`;
  return `${wanting.length} of ${rows.length} rams ask for a visit${lost > 0 ? `; together they deliver ${shownNumber(Math.round(lost / 10) * 10, 0)} litres a day less than they should` : ''}. The first on the list first.`;
}

function Filter({ rows }: { rows: RoundsRow[] }) {
  return (
    <fieldset class="filter">
      <legend>Show</legend>
      <button
        type="button"
        aria-pressed={only.value === null}
        onClick={() => {
          only.value = null;
        }}
      >
        all {rows.length}
      </button>
      {conditions.map((condition) => {
        const count = rows.filter((row) => row.condition === condition).length;
        return count === 0 ? null : (
          <button
            type="button"
            key={condition}
            aria-pressed={only.value === condition}
            onClick={() => {
              only.value = condition;
            }}
          >
            {condition} {count}
          </button>
        );
      })}
    </fieldset>
  );
}

function Row({ row, place }: { row: RoundsRow; place: number }) {
  const { latest } = row;
  return (
    <li class={`round ${row.condition.replace(' ', '-')}`}>
      <span class="place" aria-hidden="true">
        {place}
      </span>
      <div class="who">
        <h2>
          <a href={ramAddress(row.key)}>{row.ram}</a>
        </h2>
        <ConditionMark condition={row.condition} />
        {row.finding !== null && <span class="class">{row.finding.class}</span>}
      </div>
      <p class="why">{row.sentence}</p>
      <dl class="brief">
        {row.litres_lost_per_day !== null && row.litres_lost_per_day > 0 && (
          <Pair term="missing a day" value={`${shownNumber(row.litres_lost_per_day, 0)} L`} />
        )}
        {row.people_served !== null && <Pair term="people" value={String(row.people_served)} />}
        {latest?.beats_per_min && <Pair term="beats a minute" value={shownNumber(latest.beats_per_min.value, 1)} />}
        {latest?.delivery_l_per_day && (
          <Pair term="delivery a day" value={`${shownFigure(latest.delivery_l_per_day).value} L`} />
        )}
        {row.delivery_against_expected !== null && (
          <Pair term="of what is due" value={share(row.delivery_against_expected)} />
        )}
        {latest?.efficiency_daubuisson && <Pair term="efficiency" value={share(latest.efficiency_daubuisson.value)} />}
        {row.days_without_word !== null && <Pair term="last record" value={since(row.days_without_word)} />}
      </dl>
      <DeliveryLine values={row.recent_delivery_l_per_day} name={row.ram} />
    </li>
  );
}

function Empty() {
  return (
    <div class="empty">
      <p class="lead">No rams yet.</p>
      <ol>
        <li>
          <a href="#/new">Add a ram</a>: its fall, its lift, its pipes, its tank and sensors.
        </li>
        <li>
          <a href="#/load">Load the file</a> that its logger left behind.
        </li>
        <li>Come back here: the ram that needs a visit first stands on top.</li>
      </ol>
    </div>
  );
}
