import { useEffect, useRef, useState } from 'preact/hooks';
import type { RamDetail } from '../../server/shapes/ram';
import type { SeasonCharts as Season } from '../../server/shapes/series';
import { api } from '../api';
import { shortDay } from '../dates';
import { shownNumber } from '../numbers';
import { Scroll } from '../scroll';
import { chartedNames, chartTitle, lastDays, moved, type Window } from './season-data';
import type { drawSeason } from './season-drawing';

type Drawing = ReturnType<typeof drawSeason>;

/** Fall, beats, delivery and efficiency over one time axis, with what was expected, visits and findings. */
export function SeasonCharts({ ram }: { ram: RamDetail }) {
  const whole: Window = { from: Date.parse(ram.first_record_at!), to: Date.parse(ram.last_record_at!) };
  const [window, setWindow] = useState<Window>(lastDays(whole, 366));
  const [season, setSeason] = useState<Season | null>(null);
  const [why, setWhy] = useState<string | null>(null);
  const [asTable, setAsTable] = useState(false);
  const canvases = useRef<(HTMLCanvasElement | null)[]>([]);
  const drawings = useRef<Drawing[]>([]);

  useEffect(() => {
    let current = true;
    api.season(ram.key, window.from, window.to).then(
      (fetched) => current && setSeason(fetched),
      (error: Error) => current && setWhy(error.message),
    );
    return () => {
      current = false;
    };
  }, [ram.key, window.from, window.to]);

  useEffect(() => {
    let current = true;
    if (season === null) return;
    void import('./season-drawing').then(({ drawSeason }) => {
      if (!current) return;
      if (drawings.current.length === 0)
        drawings.current = chartedNames.map((name, i) =>
          drawSeason(canvases.current[i]!, name, i === chartedNames.length - 1, setWindow),
        );
      for (const drawing of drawings.current)
        drawing.show(season, window, { visits: ram.visits, findings: ram.findings });
    });
    return () => {
      current = false;
    };
  }, [season]);
  useEffect(
    () => () => {
      for (const drawing of drawings.current) drawing.destroy();
      drawings.current = [];
    },
    [],
  );

  const button = (label: string, next: Window) => (
    <button type="button" onClick={() => setWindow(next)}>
      {label}
    </button>
  );
  return (
    <section class="season" aria-labelledby="season-title">
      <h2 id="season-title">Seasons</h2>
      <fieldset class="filter">
        <legend>Span</legend>
        {button('last 3 months', lastDays(whole, 92))}
        {button('last year', lastDays(whole, 366))}
        {button('all', whole)}
        {button('earlier', moved(window, whole, 'earlier'))}
        {button('later', moved(window, whole, 'later'))}
        {button('closer', moved(window, whole, 'closer'))}
        {button('wider', moved(window, whole, 'wider'))}
        <button type="button" aria-pressed={asTable} onClick={() => setAsTable(!asTable)}>
          as a table
        </button>
      </fieldset>
      <p class="faded" aria-live="polite">
        {shortDay(new Date(window.from).toISOString())} to {shortDay(new Date(window.to).toISOString())}
        {season !== null && season.days_per_bucket > 1 ? `, ${season.days_per_bucket} days to a point` : ''}. Line:
        daily mean. Shaded: {season !== null && season.days_per_bucket > 1 ? 'least to greatest day' : '95 % interval'}.
        Dashed: what the ram should do at that day's fall. Draw across a chart to come closer.
      </p>
      {why !== null && (
        <p class="refused" role="alert">
          {why}
        </p>
      )}
      {chartedNames.map((name, i) => (
        <figure class={`chart${i === chartedNames.length - 1 ? ' last' : ''}`} key={name}>
          <figcaption>{chartTitle[name]}</figcaption>
          <div class="canvas">
            <canvas
              ref={(canvas) => {
                canvases.current[i] = canvas;
              }}
              role="img"
              aria-label={`${chartTitle[name]} of ${ram.installation.name}; the same numbers stand in the table.`}
            />
          </div>
        </figure>
      ))}
      {asTable && season !== null && <SeasonTable season={season} />}
    </section>
  );
}

function SeasonTable({ season }: { season: Season }) {
  return (
    <Scroll label="Season figures as a table" tall>
      <table>
        <thead>
          <tr>
            <th scope="col">day</th>
            {chartedNames.map((name) => (
              <th scope="col" key={name}>
                {chartTitle[name]}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {season.at_ms.map((at, i) => (
            <tr key={at}>
              <th scope="row">{shortDay(new Date(at).toISOString())}</th>
              {chartedNames.map((name) => {
                const value = season[name].mean[i] ?? null;
                return (
                  <td key={name}>
                    {value === null
                      ? ''
                      : shownNumber(
                          name === 'efficiency_daubuisson' ? value * 100 : value,
                          name === 'fall_m' ? 2 : name === 'delivery_l_per_day' ? 0 : 1,
                        )}
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </Scroll>
  );
}
