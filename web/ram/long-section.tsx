import type { SpanFigures } from '../../server/shapes/figure';
import type { Installation } from '../../server/shapes/installation';
import { shownFigure, shownNumber } from '../numbers';
import { layOut, stretched } from './section-geometry';

interface Props {
  installation: Installation;
  latest: SpanFigures | null;
  /** Depth in the tank, m, where known. */
  tankLevel_m?: number | null;
}

const wideMargin = { top: 50, right: 30, bottom: 92, left: 150 };

const litres = (value: number) => shownNumber(value >= 1000 ? Math.round(value / 10) * 10 : value, 0);

/** The installation as an engineer draws it, to scale from its own numbers, with the latest figures at each part. */
export function LongSection(props: Props) {
  return (
    <figure class="section">
      <Drawing {...props} width={1000} height={460} wide />
      <Drawing {...props} width={360} height={430} />
      <Scales installation={props.installation} />
    </figure>
  );
}

function Drawing({
  installation,
  latest,
  width,
  height,
  wide = false,
}: Props & { width: number; height: number; wide?: boolean }) {
  const margin = wide ? wideMargin : { top: 44, right: 6, bottom: 86, left: 62 };
  const at = layOut(installation, width, height, margin);
  const { valve, source, outlet, tank, ground } = at;
  const kinkX = valve.x + 26;
  const delivery = latest?.delivery_l_per_day;
  const waste = latest?.waste_l_per_day;
  const beats = latest?.beats_per_min;
  const words = `Long-section of ${installation.name}: a fall of ${installation.fall_m} m over a drive pipe of ${installation.drive_pipe.length_m} m, and a lift of ${installation.lift_m} m${installation.delivery_pipe === undefined ? '' : ` over a delivery pipe of ${installation.delivery_pipe.length_m} m`}.`;
  const size = wide ? 15 : 12.5;
  return (
    <svg
      class={wide ? 'wide' : 'narrow'}
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={words}
      font-size={size}
    >
      <path
        class="soil"
        d={`M0 ${source.y + 10} L${source.x + 16} ${source.y + 10} L${valve.x - 26} ${ground + 12} H${kinkX + 20} L${outlet.x - 4} ${tank.floor + 4} H${width} V${height - 64} H0 Z`}
      />
      <path class="datum" d={`M${wide ? 16 : 4} ${ground} H${width - margin.right}`} />
      <path class="datum" d={`M${source.x} ${source.y} H${valve.x - 8}`} />
      <path
        class="water"
        d={`M${Math.max(2, source.x - (wide ? 84 : 36))} ${source.y} H${source.x + 12} V${source.y + 10} H${Math.max(2, source.x - (wide ? 84 : 36))} Z`}
      />
      <path class="surface" d={`M${Math.max(2, source.x - (wide ? 84 : 36))} ${source.y} H${source.x + 12}`} />
      <path class="pipe drive" d={`M${source.x} ${source.y + 6} L${valve.x - 12} ${ground - 3}`} />
      <path class="pipe delivery" d={`M${kinkX} ${ground - 4} L${outlet.x + 2} ${tank.floor - 3}`} />
      <RamBody x={valve.x} y={ground} />
      <TankBody tank={tank} />
      <Dimension
        x={wide ? 26 : 10}
        from={source.y}
        to={ground}
        label={`fall ${figureOr(latest?.fall_m, installation.fall_m)} m`}
        side="right"
        under={!wide}
      />
      <Dimension
        x={width - margin.right - (wide ? 8 : 4)}
        from={outlet.y}
        to={ground}
        label={`lift ${installation.lift_m} m`}
        side="left"
      />
      <text x={Math.max(2, source.x - (wide ? 84 : 36))} y={source.y - 9} class="part">
        source
      </text>
      <text x={(source.x + valve.x) / 2} y={ground + 40} class="part" text-anchor="middle">
        {wide
          ? `drive pipe ${installation.drive_pipe.length_m} m, bore ${installation.drive_pipe.bore_mm} mm`
          : `drive ${installation.drive_pipe.length_m} m`}
      </text>
      <text
        x={wide ? (kinkX + outlet.x) / 2 + 60 : (kinkX + width) / 2 + 16}
        y={ground + 40}
        class="part"
        text-anchor="middle"
      >
        {installation.delivery_pipe === undefined
          ? 'delivery pipe, length not stated'
          : wide
            ? `delivery pipe ${installation.delivery_pipe.length_m} m, bore ${installation.delivery_pipe.bore_mm} mm`
            : `delivery ${installation.delivery_pipe.length_m} m`}
      </text>
      {beats && (
        <text x={valve.x} y={ground - 58} text-anchor="middle" class="figure">
          {shownNumber(beats.value, 1)}
          <tspan class="unit"> beats/min</tspan>
        </text>
      )}
      {waste && wide && (
        <text x={valve.x - 6} y={ground + 66} text-anchor="middle" class="figure">
          {litres(waste.value)}
          <tspan class="unit"> L/day wasted</tspan>
        </text>
      )}
      {delivery && (
        <text x={tank.right} y={tank.brim - 14} text-anchor="end" class="figure">
          {litres(delivery.value)}
          <tspan class="unit"> L/day {delivery.footing === 'from tank' ? 'into the tank' : 'delivered'}</tspan>
        </text>
      )}
      {latest?.chamber_head_m && wide && (
        <text x={kinkX + 16} y={ground + 22} class="figure small">
          {shownFigure(latest.chamber_head_m).value}
          <tspan class="unit"> m in the chamber</tspan>
        </text>
      )}
    </svg>
  );
}

const figureOr = (figure: SpanFigures['fall_m'] | undefined, stated: number): string =>
  figure ? shownNumber(figure.value, 2) : String(stated);

/** Valve box, waste valve and air chamber: a sign for the ram, not to scale. */
function RamBody({ x, y }: { x: number; y: number }) {
  return (
    <g class="ram" transform={`translate(${x} ${y})`}>
      <path d="M-14 -9 H28 V5 H-14 Z" />
      <path d="M8 -9 V-30 A9 9 0 0 1 26 -30 V-9 Z" class="chamber" />
      <path d="M-10 -9 V-15 H4 V-9 M-3 -9 V-21" />
      <path d="M-11 14 L-8 9 M-4 15 L-3 9 M3 14 L1 9" class="drops" />
    </g>
  );
}

function TankBody({ tank }: { tank: ReturnType<typeof layOut>['tank'] }) {
  const half = (tank.floor + tank.brim) / 2;
  return (
    <g class="tank">
      <path class="water" d={`M${tank.left} ${half} H${tank.right} V${tank.floor} H${tank.left} Z`} />
      {tank.lying ? (
        <rect
          x={tank.left}
          y={tank.brim}
          width={tank.right - tank.left}
          height={tank.floor - tank.brim}
          rx={Math.min(14, (tank.floor - tank.brim) / 2)}
        />
      ) : (
        <path d={`M${tank.left} ${tank.brim} V${tank.floor} H${tank.right} V${tank.brim}`} />
      )}
    </g>
  );
}

/** A height between two ticks, its measure beside it, or under it where there is no room. */
function Dimension({
  x,
  from,
  to,
  label,
  side,
  under = false,
}: {
  x: number;
  from: number;
  to: number;
  label: string;
  side: 'left' | 'right';
  under?: boolean;
}) {
  const short = under || to - from < 30;
  const y = short ? to + 22 : (from + to) / 2 + 5;
  return (
    <g class="dimension">
      <path
        d={`M${x - 6} ${from} H${x + 6} M${x - 6} ${to} H${x + 6} M${x} ${from} V${to} M${x - 4} ${from + 4} L${x + 4} ${from - 4} M${x - 4} ${to + 4} L${x + 4} ${to - 4}`}
      />
      <text x={side === 'left' ? x - 8 : short ? x - 6 : x + 9} y={y} text-anchor={side === 'left' ? 'end' : 'start'}>
        {label}
      </text>
    </g>
  );
}

function Scales({ installation }: { installation: Installation }) {
  const at = layOut(installation, 1000, 460, wideMargin);
  return (
    <figcaption class="faded">
      Drawn to scale from the installation's numbers. Drive side: {stretched(at.upwards, at.drive)}; delivery side:{' '}
      {stretched(at.upwards, at.delivery)}
      {at.deliveryIsStated ? '' : ' (length of the delivery pipe not stated, slope assumed)'}. The ram itself is a sign,
      not to scale. Heights are above the waste valve outlet.
    </figcaption>
  );
}
