import type { Figure, SpanFigures } from '../../server/shapes/figure';
import { shownFigure } from '../numbers';
import { Scroll } from '../scroll';

interface Line {
  name: string;
  figure: Figure | null;
  unit: string;
  factor?: number;
  how?: string;
}

/** The latest day's figures, each with its interval, its footing and what dominates its doubt. */
export function FiguresTable({ latest }: { latest: SpanFigures }) {
  const heads = `with the lift of ${latest.lift_m?.value ?? '?'} m and the fall of ${latest.fall_m === null ? '?' : shownFigure(latest.fall_m).value} m`;
  const lines: Line[] = [
    { name: 'Fall', figure: latest.fall_m, unit: 'm' },
    { name: 'Beats', figure: latest.beats_per_min, unit: 'a minute' },
    { name: 'Delivery', figure: latest.delivery_l_per_day, unit: 'L/day' },
    {
      name: 'Inflow of the tank',
      figure: latest.delivery_l_per_day?.footing === 'metered' ? latest.tank_inflow_l_per_day : null,
      unit: 'L/day',
    },
    { name: 'Waste', figure: latest.waste_l_per_day, unit: 'L/day' },
    { name: 'Drive flow', figure: latest.drive_l_per_day, unit: 'L/day' },
    { name: 'Delivered per beat', figure: latest.delivered_l_per_beat, unit: 'L' },
    { name: 'Wasted per beat', figure: latest.waste_l_per_beat, unit: 'L' },
    { name: 'Head in the chamber', figure: latest.chamber_head_m, unit: 'm' },
    { name: 'Ripple in the chamber', figure: latest.chamber_ripple_kpa, unit: 'kPa' },
    {
      name: "Efficiency, D'Aubuisson",
      figure: latest.efficiency_daubuisson,
      unit: '%',
      factor: 100,
      how: `q·h / ((Q + q)·H), ${heads}`,
    },
    {
      name: 'Efficiency, Rankine',
      figure: latest.efficiency_rankine,
      unit: '%',
      factor: 100,
      how: `q·(h − H) / (Q·H), ${heads}`,
    },
  ];
  return (
    <Scroll label="Figures of the latest day">
      <table class="figures">
        <thead>
          <tr>
            <th scope="col">figure</th>
            <th scope="col">value, 95 % interval</th>
            <th scope="col">footing</th>
            <th scope="col">its doubt comes from</th>
          </tr>
        </thead>
        <tbody>
          {lines.map(({ name, figure, unit, factor, how }) => {
            if (figure === null) return null;
            const { value, interval } = shownFigure(figure, factor);
            return (
              <tr key={name}>
                <th scope="row">
                  {name}
                  {how !== undefined && <small class="faded"> {how}</small>}
                </th>
                <td>
                  <strong>{value}</strong> {unit} <span class="faded nowrap">{interval}</span>
                </td>
                <td>{figure.footing}</td>
                <td>{figure.dominated_by ?? ''}</td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </Scroll>
  );
}
