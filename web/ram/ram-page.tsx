import type { RamDetail, StoredVisit } from '../../server/shapes/ram';
import { api } from '../api';
import { Shown, useAsked } from '../asked';
import { ConditionMark } from '../condition-mark';
import { day, instant, zoneName } from '../dates';
import { Sheet } from '../sheet';
import { Bursts } from './bursts';
import { FiguresTable } from './figures-table';
import { FindingArticle } from './finding-article';
import { LongSection } from './long-section';
import { SeasonCharts } from './season-charts';

export function RamPage({ ram }: { ram: string }) {
  const asked = useAsked(ram, () => api.ram(ram));
  return (
    <Sheet title={asked.state === 'here' ? asked.value.installation.name : 'Ram'}>
      <Shown asked={asked}>{(detail) => <Detail ram={detail} />}</Shown>
    </Sheet>
  );
}

function Detail({ ram }: { ram: RamDetail }) {
  const open = ram.findings.filter((finding) => finding.open);
  const ended = ram.findings.filter((finding) => !finding.open);
  const zone = ram.installation.time_zone;
  const key = encodeURIComponent(ram.key);
  return (
    <>
      <p class="lead">
        <ConditionMark condition={ram.condition} /> {ram.sentence}
      </p>
      <p class="faded">
        {ram.installation.serves !== undefined && <>{ram.installation.serves}. </>}
        {ram.last_record_at !== null && (
          <>
            Last record {instant(ram.last_record_at, zone)} ({zoneName(zone)}).{' '}
          </>
        )}
        {ram.set_up_span !== null && (
          <>
            Set-up span: {day(ram.set_up_span.from)} to {day(ram.set_up_span.to)}, {ram.set_up_span.days} good days
            {ram.set_up_span.provisional ? ', provisional' : ''}.
          </>
        )}
      </p>
      <p class="actions">
        <a class="button" href={`#/load/${key}`}>
          Load a file
        </a>
        <a class="button" href={`#/visit/${key}`}>
          Enter a visit
        </a>
        <button type="button" onClick={() => window.print()}>
          Print
        </button>
      </p>
      <LongSection installation={ram.installation} latest={ram.latest} />
      {open.length > 0 && (
        <section aria-labelledby="findings-title">
          <h2 id="findings-title">Findings</h2>
          {open.map((finding) => (
            <FindingArticle key={finding.finding_id} finding={finding} />
          ))}
        </section>
      )}
      {ram.latest !== null && (
        <section aria-labelledby="figures-title">
          <h2 id="figures-title">
            Figures of {day(ram.latest.date ?? ram.latest.from, ram.latest.date === undefined ? zone : 'UTC')}
          </h2>
          <FiguresTable latest={ram.latest} />
        </section>
      )}
      {ram.first_record_at !== null && <SeasonCharts ram={ram} />}
      {ended.length > 0 && (
        <section aria-labelledby="ended-title">
          <h2 id="ended-title">Ended findings</h2>
          {ended.map((finding) => (
            <details key={finding.finding_id}>
              <summary>
                {day(finding.noticed_on)}: {finding.sentence}
              </summary>
              <FindingArticle finding={finding} />
            </details>
          ))}
        </section>
      )}
      {ram.bursts.length > 0 && <Bursts ram={ram} />}
      <section aria-labelledby="visits-title">
        <h2 id="visits-title">Visits</h2>
        {ram.visits.length === 0 ? (
          <p>None entered yet. Bucket tests at a visit tell the litres of a beat.</p>
        ) : (
          <Visits visits={ram.visits} />
        )}
      </section>
      <section aria-labelledby="loads-title">
        <h2 id="loads-title">Loaded files</h2>
        {ram.loads.length === 0 && <p>None yet.</p>}
        <ul class="plain">
          {ram.loads.map((load) => (
            <li key={load.load_id}>
              <a href={`#/receipt/${load.load_id}`}>{load.file}</a>, {load.rows_new} new records, loaded{' '}
              {instant(load.loaded_at, zone)}
            </li>
          ))}
        </ul>
      </section>
    </>
  );
}

function Visits({ visits }: { visits: StoredVisit[] }) {
  return (
    <ol class="visits">
      {visits.map((visit) => (
        <li key={visit.visit_id}>
          <b>{day(visit.on)}</b> {visit.who !== undefined && <span class="faded">{visit.who}</span>}
          {visit.actions.length > 0 && <span>: {visit.actions.join(', ')}</span>}
          <span>
            {visit.bucket_tests.map((test) => {
              const mean = test.seconds.reduce((sum, s) => sum + s, 0) / test.seconds.length;
              return ` ${test.of} ${(test.litres / mean).toFixed(3)} L/s (${test.litres} L in ${mean.toFixed(1)} s, ${test.seconds.length} ×);`;
            })}
            {visit.counted_beats !== undefined &&
              ` ${((visit.counted_beats.beats * 60) / visit.counted_beats.seconds).toFixed(1)} beats a minute counted.`}
          </span>
          {visit.note !== undefined && <p class="note">{visit.note}</p>}
        </li>
      ))}
    </ol>
  );
}
