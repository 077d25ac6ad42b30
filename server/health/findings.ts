import type { Observable, SpanFigures } from '../shapes/figure';
import type { Cause, Finding, FindingClass } from '../shapes/finding';
import type { Installation } from '../shapes/installation';
import { median } from '../statistics/robust';
import { cautionsFor, checksFor, partsFor } from './advice';
import { rankCauses, type Shift } from './causes';
import { beganOn, type Departure, type RatioSeries } from './departures';
import type { RegimeModel } from './expectation';
import { arriving, charted } from './observables';
import { signaturesFor } from './signatures';
import { capital, heldAgainst, inWords, joined, looksLike, sizeInWords, subject } from './words';

/** Size and causes are told from the last fortnight of a departure. */
const RECENT_DAYS = 14;

export interface Context {
  ram: string;
  installation: Installation;
  days: readonly SpanFigures[];
  models: readonly RegimeModel[];
  series: ReadonlyMap<Observable, RatioSeries>;
  /** Expected delivery of a day, litres; null where nothing is expected. */
  expectedDelivery: (day: number) => number | null;
}

/** Groups the departures of the charts into events (what is noticed while another lasts belongs to it) and describes each. */
export function findingsOf(departures: readonly Departure[], context: Context): Finding[] {
  const sorted = [...departures].sort((a, b) => a.noticed - b.noticed);
  const events: Departure[][] = [];
  for (const departure of sorted) {
    const open = events.find((event) =>
      event.some((one) => (one.ended ?? Number.POSITIVE_INFINITY) >= departure.noticed),
    );
    if (open === undefined) events.push([departure]);
    else open.push(departure);
  }
  return events.map((event) => describe(event, context)).filter((finding): finding is Finding => finding !== null);
}

function describe(event: Departure[], context: Context): Finding | null {
  const { days, series, models } = context;
  const ends = event.map((one) => one.ended);
  const ended = ends.includes(null) ? null : Math.max(...(ends as number[]));
  const noticed = Math.min(...event.map((one) => one.noticed));
  const model = models.find(({ regime }) => noticed >= regime.first && noticed < regime.end);
  if (model === undefined) return null;
  const shifts = shiftsAt(ended ?? days.length, noticed, model, series);
  if (shifts.length === 0) return null;
  const { causes, tied } = rankCauses(shifts, signaturesFor(model, context.installation));
  const afterSpan = model.regime.baseline.at(-1)! + 1;
  const begins = event.map((one) => beganOn(series.get(one.observable)!, one, afterSpan));
  const began = Math.min(noticed, Math.round(median(begins)));
  const leading = leadingOf(event, shifts);
  const loss = lossOf(context, began, ended);
  const likely = tied.length > 0 ? tied : causes.slice(0, 1).map(({ cause }) => cause);
  const size = shifts.find((shift) => shift.observable === leading.observable);
  return {
    finding_id: `${days[began]!.date}-${leading.observable}`,
    ram: context.ram,
    class: classOf(shifts, context, ended, loss.share),
    open: ended === null,
    began_on: days[began]!.date!,
    noticed_on: days[noticed]!.date!,
    ended_on: ended === null ? null : (days[ended]?.date ?? days.at(-1)!.date!),
    observable: leading.observable,
    size:
      size === undefined
        ? null
        : {
            value: Math.exp(size.size) - 1,
            low: Math.exp(size.size - 1.96 * size.u) - 1,
            high: Math.exp(size.size + 1.96 * size.u) - 1,
          },
    sentence: sentenceOf(leading.observable, size?.size ?? 0, days[began]!.date!, likely, ended === null),
    causes,
    tied,
    evidence: evidenceOf(shifts, event, likely[0]!, model, context),
    checks: checksFor([
      ...new Set([...likely, ...causes.filter(({ probability }) => probability >= 0.1).map(({ cause }) => cause)]),
    ]),
    cautions: cautionsFor(likely),
    parts: partsFor(causes.filter(({ probability }) => probability >= 0.15).map(({ cause }) => cause)),
    litres_lost_per_day: loss.per_day,
    litres_lost: loss.all,
  };
}

/** Shifts of all observables over the last good days of a departure. */
function shiftsAt(
  end: number,
  noticed: number,
  model: RegimeModel,
  series: ReadonlyMap<Observable, RatioSeries>,
): Shift[] {
  const shifts: Shift[] = [];
  for (const [observable, { ratio, lasting_sd, theory_sd }] of series) {
    const recent: number[] = [];
    const doubts: number[] = [];
    for (
      let d = end - 1;
      d >= Math.max(model.regime.first, noticed - RECENT_DAYS) && recent.length < RECENT_DAYS;
      d--
    ) {
      if (Number.isNaN(ratio[d]!)) continue;
      recent.push(ratio[d]!);
      doubts.push(Math.hypot(lasting_sd[d]! / Math.sqrt(3), theory_sd[d]!));
    }
    if (recent.length >= 3) shifts.push({ observable, size: median(recent), u: median(doubts) });
  }
  return shifts;
}

/** The observable that speaks for the event: delivery where it moved, else the one furthest beyond its own limit. */
function leadingOf(event: readonly Departure[], shifts: readonly Shift[]): Departure {
  const beyond = (departure: Departure) => {
    const shift = shifts.find((one) => one.observable === departure.observable);
    return shift === undefined ? 0 : Math.abs(shift.size) / charted[departure.observable].watch;
  };
  const delivery = event.find((one) => one.observable === 'delivery_l_per_day' && one.direction < 0);
  return delivery ?? [...event].sort((a, b) => beyond(b) - beyond(a))[0]!;
}

function classOf(
  shifts: readonly Shift[],
  { installation, days }: Context,
  ended: number | null,
  lossShare: number | null,
): FindingClass {
  const past = (limit: 'plan' | 'go') =>
    shifts.some(
      ({ observable, size }) =>
        (observable === 'delivery_l_per_day' || observable === 'delivered_l_per_beat' ? -size : Math.abs(size)) >=
        charted[observable][limit],
    );
  const delivery = days[(ended ?? days.length) - 1]?.delivery_l_per_day?.value;
  const underFloor =
    installation.floor_l_per_day !== undefined &&
    delivery !== undefined &&
    delivery < installation.floor_l_per_day &&
    (lossShare ?? 0) > 0.05;
  if (past('go') || underFloor || (lossShare ?? 0) >= 0.25) return 'go now';
  return past('plan') || (lossShare ?? 0) >= 0.1 ? 'plan a visit' : 'watch';
}

function lossOf(
  { days, expectedDelivery }: Context,
  began: number,
  ended: number | null,
): { per_day: number | null; all: number | null; share: number | null } {
  const losses: { litres: number; share: number }[] = [];
  let all = 0;
  for (let d = began; d < (ended ?? days.length); d++) {
    const arrived = arriving(days[d]!);
    const expected = expectedDelivery(d);
    if (arrived === null || expected === null) continue;
    losses.push({ litres: expected - arrived, share: 1 - arrived / expected });
    all += expected - arrived;
  }
  if (losses.length === 0) return { per_day: null, all: null, share: null };
  const recent = losses.slice(-RECENT_DAYS);
  return {
    per_day: Math.round(Math.max(0, median(recent.map((one) => one.litres)))),
    all: Math.round(Math.max(0, all)),
    share: median(recent.map((one) => one.share)),
  };
}

function sentenceOf(
  observable: Observable,
  size: number,
  began: string,
  likely: readonly Cause[],
  open: boolean,
): string {
  const stood = open ? 'stand' : 'stood';
  const verb = /^(?:beats|litres)/.test(subject[observable]) ? stood : `${stood}s`.replace('stoods', 'stood');
  const causes = joined(
    likely.slice(0, 3).map((cause) => looksLike[cause]),
    'or',
  );
  return `Since ${inWords(began)} ${subject[observable]} ${verb} ${sizeInWords(size)} ${heldAgainst[observable]}; this looks like ${causes}.`;
}

function evidenceOf(
  shifts: readonly Shift[],
  event: readonly Departure[],
  likely: Cause,
  model: RegimeModel,
  { installation, days }: Context,
): Finding['evidence'] {
  const expected = signaturesFor(model, installation).find(({ cause }) => cause === likely)?.shifts ?? {};
  return shifts.map(({ observable, size, u }) => {
    const moved = Math.abs(size) > Math.max(2 * u, 0.02);
    const due = expected[observable] ?? 0;
    const departure = event.find((one) => one.observable === observable);
    const since = departure === undefined ? '' : ` (noticed on ${inWords(days[departure.noticed]!.date!)})`;
    const text = moved
      ? `${capital(subject[observable])}: ${sizeInWords(size)} the expectation, give or take ${Math.max(1, Math.round(196 * u))} %${since}.`
      : `${capital(subject[observable])}: as expected, give or take ${Math.max(1, Math.round(196 * u))} %.`;
    const fits = moved ? Math.sign(due) === Math.sign(size) && Math.abs(due) > 0.003 : Math.abs(due) < 0.06;
    return { text, speaks: fits ? ('for' as const) : ('against' as const) };
  });
}
