import type { Receipt as ReceiptShape } from '../../server/shapes/load';
import { shownNumber } from '../numbers';
import { Pair } from '../pair';
import { ramAddress } from '../router';
import { Scroll } from '../scroll';
import { channelChoices } from './channel-choices';

/** What a load did: rows new, known and refused with the reason, channels, gaps. */
export function Receipt({ receipt }: { receipt: ReceiptShape }) {
  const count = (n: number) => shownNumber(n, 0);
  const when = (iso: string) => iso.slice(0, 16).replace('T', ' ');
  return (
    <div class="receipt">
      <p class="lead">
        {receipt.rows_new > 0 ? `${count(receipt.rows_new)} new records stored.` : 'Nothing new in this file.'}{' '}
        <a href={ramAddress(receipt.ram)}>Look at {receipt.ram}</a>
      </p>
      <dl class="brief">
        <Pair term="rows read" value={count(receipt.rows_read)} />
        <Pair term="new" value={count(receipt.rows_new)} />
        <Pair term="known already" value={count(receipt.rows_known)} />
        <Pair term="contradicting" value={count(receipt.rows_contradicting)} />
        <Pair term="refused" value={count(receipt.rows_refused)} />
        {receipt.first_at !== null && <Pair term="first record, UTC" value={when(receipt.first_at)} />}
        {receipt.last_at !== null && <Pair term="last record, UTC" value={when(receipt.last_at)} />}
        {receipt.step_s !== null && (
          <Pair term="usual step" value={receipt.step_s >= 60 ? `${receipt.step_s / 60} min` : `${receipt.step_s} s`} />
        )}
        <Pair term="days worked out" value={count(receipt.days_recomputed)} />
      </dl>
      {receipt.rows_contradicting > 0 && <p>Where an earlier file told otherwise, this newer file wins.</p>}
      <Scroll label="Columns read">
        <table>
          <thead>
            <tr>
              <th scope="col">column</th>
              <th scope="col">read as</th>
              <th scope="col">unit</th>
              <th scope="col">values</th>
              <th scope="col">missing</th>
            </tr>
          </thead>
          <tbody>
            {receipt.channels.map((channel) => (
              <tr key={channel.channel}>
                <td>{channel.label}</td>
                <td>{channelChoices[channel.channel].words}</td>
                <td>{channel.unit}</td>
                <td>{count(channel.values)}</td>
                <td>{count(channel.missing)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </Scroll>
      {receipt.gaps.length > 0 && (
        <>
          <h3>Gaps</h3>
          <ul>
            {receipt.gaps.slice(0, 12).map((gap) => (
              <li key={gap.from}>
                {when(gap.from)} to {when(gap.to)} UTC
              </li>
            ))}
            {receipt.gaps.length > 12 && <li>and {receipt.gaps.length - 12} more</li>}
          </ul>
        </>
      )}
      {receipt.notes.length > 0 && (
        <>
          <h3>Noticed</h3>
          <ul>
            {receipt.notes.map((note) => (
              <li key={note}>{note}</li>
            ))}
          </ul>
        </>
      )}
      {receipt.refusals.length > 0 && (
        <>
          <h3>Lines that were refused</h3>
          <ol class="refusals">
            {receipt.refusals.slice(0, 50).map((refusal) => (
              <li key={refusal.line}>
                line {refusal.line}: {refusal.reason}
              </li>
            ))}
            {receipt.rows_refused > 50 && <li>and {count(receipt.rows_refused - 50)} more</li>}
          </ol>
        </>
      )}
      <p class="faded">
        <a href={`/api/loads/${receipt.load_id}/original`}>The file as it was loaded</a>, SHA-256{' '}
        <code class="hash">{receipt.sha256}</code>
      </p>
    </div>
  );
}
