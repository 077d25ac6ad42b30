import type { Finding } from '../../server/shapes/finding';
import { day } from '../dates';
import { change, shownNumber } from '../numbers';
import { Pair } from '../pair';

const chance = (probability: number): string =>
  probability >= 0.8
    ? 'very likely'
    : probability >= 0.5
      ? 'likely'
      : probability >= 0.25
        ? 'possible'
        : probability >= 0.1
          ? 'less likely'
          : 'unlikely';

/** A finding with its dates, size, causes, evidence, checks, cautions and parts. */
export function FindingArticle({ finding }: { finding: Finding }) {
  const id = `finding-${finding.finding_id}`;
  return (
    <article
      class={`finding ${finding.open ? 'open' : 'ended'} ${finding.class.replaceAll(' ', '-')}`}
      aria-labelledby={id}
    >
      <h3 id={id}>
        <span class="class">{finding.class}</span> {finding.sentence}
      </h3>
      <dl class="brief">
        <Pair term="began" value={day(finding.began_on)} />
        <Pair term="noticed" value={day(finding.noticed_on)} />
        {finding.ended_on !== null && <Pair term="ended" value={day(finding.ended_on)} />}
        {finding.size !== null && (
          <Pair
            term="size"
            value={`${change(finding.size.value)} (${change(finding.size.low)} to ${change(finding.size.high)})`}
          />
        )}
        {finding.litres_lost_per_day !== null && finding.open && (
          <Pair term="missing a day" value={`${shownNumber(finding.litres_lost_per_day, 0)} L`} />
        )}
        {finding.litres_lost !== null && (
          <Pair term="missing so far" value={`${shownNumber(finding.litres_lost, 0)} L`} />
        )}
      </dl>
      <div class="columns">
        <section>
          <h4>What it may be</h4>
          <ul class="causes">
            {finding.causes.slice(0, 5).map(({ cause, probability }) => (
              <li key={cause}>
                <span>
                  {cause}{' '}
                  <span class="faded">
                    {chance(probability)}, {Math.round(probability * 100)} %
                  </span>
                </span>
                <span class="bar" aria-hidden="true">
                  <span style={{ width: `${Math.max(1, probability * 100)}%` }} />
                </span>
              </li>
            ))}
          </ul>
          {finding.tied.length > 1 && (
            <p>These sensors cannot tell apart: {finding.tied.join(', ')}. The checks can.</p>
          )}
          <h4>Evidence</h4>
          <ul class="evidence">
            {finding.evidence.map(({ text, speaks }) => (
              <li key={text} class={speaks}>
                <b>{speaks === 'for' ? 'for' : 'against'}</b> {text}
              </li>
            ))}
          </ul>
        </section>
        <section>
          <h4>At the ram, in this order</h4>
          <ol>
            {finding.checks.map((check) => (
              <li key={check}>{check}</li>
            ))}
          </ol>
          {finding.parts.length > 0 && (
            <p>
              <b>Carry:</b> {finding.parts.join(', ')}.
            </p>
          )}
          <div class="cautions">
            <h4>Take care</h4>
            <ul>
              {finding.cautions.map((caution) => (
                <li key={caution}>{caution}</li>
              ))}
            </ul>
          </div>
        </section>
      </div>
    </article>
  );
}
