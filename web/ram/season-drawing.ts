import { Chart, Filler, LinearScale, LineController, LineElement, PointElement, Tooltip } from 'chart.js';
import annotation, { type AnnotationOptions } from 'chartjs-plugin-annotation';
import zoom from 'chartjs-plugin-zoom';
import type { Finding } from '../../server/shapes/finding';
import type { StoredVisit } from '../../server/shapes/ram';
import type { SeasonCharts } from '../../server/shapes/series';
import { type ChartedName, chartTitle, drawn, type Window } from './season-data';
import { tickLabel, ticksBetween } from './season-ticks';

Chart.register(LineController, LineElement, PointElement, LinearScale, Filler, Tooltip, annotation, zoom);

const ink = '#16222d';
const faded = '#45535f';
const water = '#0b568a';
const rust = '#97330f';

export interface Marks {
  visits: StoredVisit[];
  findings: Finding[];
}

/** Draws one figure of the season on a canvas; all canvases of a page share the window. */
export function drawSeason(
  canvas: HTMLCanvasElement,
  name: ChartedName,
  last: boolean,
  onWindow: (window: Window) => void,
): { show(season: SeasonCharts, window: Window, marks: Marks): void; destroy(): void } {
  const line = (change: object) => ({
    data: [] as { x: number; y: number | null }[],
    pointRadius: 0,
    borderWidth: 1,
    tension: 0,
    spanGaps: false,
    ...change,
  });
  const chart = new Chart(canvas, {
    type: 'line',
    data: {
      datasets: [
        line({ label: 'expected, low', borderColor: faded, borderDash: [5, 4] }),
        line({
          label: 'expected, high',
          borderColor: faded,
          borderDash: [5, 4],
          fill: '-1',
          backgroundColor: 'rgba(69,83,95,0.08)',
        }),
        line({ label: 'low', borderColor: 'transparent' }),
        line({ label: 'high', borderColor: 'transparent', fill: '-1', backgroundColor: 'rgba(11,86,138,0.22)' }),
        line({ label: chartTitle[name], borderColor: water, borderWidth: 1.8 }),
      ],
    },
    options: {
      animation: false,
      parsing: false,
      normalized: true,
      maintainAspectRatio: false,
      interaction: { mode: 'nearest', axis: 'x', intersect: false },
      layout: { padding: { top: 6, right: 6 } },
      scales: {
        x: {
          type: 'linear',
          grid: { color: '#e3dccb' },
          border: { color: ink },
          ticks: {
            color: ink,
            maxRotation: 0,
            autoSkip: true,
            display: last,
            callback(value) {
              return tickLabel(Number(value), this.max - this.min);
            },
          },
          afterBuildTicks: (axis) => {
            axis.ticks = ticksBetween(axis.min, axis.max).map((value) => ({ value }));
          },
        },
        y: {
          grid: { color: '#eee8da' },
          border: { color: ink },
          ticks: { color: ink, maxTicksLimit: 5 },
          // every chart's plot begins at the same place, so that days stand under one another
          afterFit: (axis) => {
            axis.width = 62;
          },
          grace: '6%',
          // none of these figures can be below nothing
          afterDataLimits: (axis) => {
            if (axis.min < 0) axis.min = 0;
          },
        },
      },
      plugins: {
        legend: { display: false },
        annotation: { annotations: {} },
        tooltip: {
          displayColors: false,
          filter: (item) => item.datasetIndex === 4,
          callbacks: {
            title: (items) =>
              items[0] === undefined ? '' : new Date(items[0].parsed.x ?? 0).toISOString().slice(0, 10),
          },
        },
        zoom: {
          pan: { enabled: true, mode: 'x', modifierKey: 'shift', onPanComplete: () => tell() },
          zoom: {
            wheel: { enabled: true, modifierKey: 'ctrl' },
            drag: { enabled: true, backgroundColor: 'rgba(11,86,138,0.15)' },
            pinch: { enabled: true },
            mode: 'x',
            onZoomComplete: () => tell(),
          },
        },
      },
    },
  });
  const tell = () => {
    const { min, max } = chart.scales.x!;
    onWindow({ from: min, to: max });
  };
  return {
    show(season, window, marks) {
      const figure = drawn(season, name);
      [figure.expectedLow, figure.expectedHigh, figure.low, figure.high, figure.mean].forEach((data, i) => {
        chart.data.datasets[i]!.data = data as never;
      });
      chart.options.scales!.x!.min = window.from;
      chart.options.scales!.x!.max = window.to;
      chart.options.plugins!.annotation!.annotations = annotationsFor(marks, window, name === 'fall_m');
      chart.update('none');
    },
    destroy: () => chart.destroy(),
  };
}

function annotationsFor(
  { visits, findings }: Marks,
  window: Window,
  labelled: boolean,
): Record<string, AnnotationOptions> {
  const out: Record<string, AnnotationOptions> = {};
  for (const finding of findings) {
    const from = Date.parse(finding.began_on);
    const to = finding.ended_on === null ? window.to : Date.parse(finding.ended_on);
    if (to < window.from || from > window.to) continue;
    out[`finding-${finding.finding_id}`] = {
      type: 'box',
      xMin: Math.max(from, window.from),
      xMax: Math.min(to, window.to),
      backgroundColor: 'rgba(151,51,15,0.07)',
      borderColor: rust,
      borderWidth: 1,
      borderDash: [2, 3],
      label: {
        display: labelled,
        content: finding.class,
        position: { x: 'start', y: 'start' },
        color: rust,
        font: { size: 11, style: 'italic', weight: 'normal' },
      },
    };
  }
  visits.forEach((visit, v) => {
    const at = Date.parse(visit.at);
    if (at < window.from || at > window.to) return;
    out[`visit-${visit.visit_id}`] = {
      type: 'line',
      xMin: at,
      xMax: at,
      borderColor: ink,
      borderWidth: 1,
      label: {
        display: labelled,
        content: `visit ${v + 1}`,
        position: 'end',
        backgroundColor: '#fffdf8',
        color: ink,
        font: { size: 11, weight: 'normal' },
        padding: 2,
      },
    };
  });
  return out;
}
