import type { DayFigures, Observable, SpanFigures } from '../shapes/figure';
import type { Condition, Finding, SetUpSpan } from '../shapes/finding';
import type { Installation } from '../shapes/installation';
import { median } from '../statistics/robust';
import { type Departure, departuresOf, type RatioSeries, ratiosOf } from './departures';
import { dueOn, learn, type RegimeModel, shownExpectation } from './expectation';
import { findingsOf } from './findings';
import { arriving, observables } from './observables';
import { isGood, regimesOf } from './set-up-span';
import { type Stop, stopFindings } from './stops';

export interface ExaminationInput {
  ram: string;
  installation: Installation;
  /** Local days in order, each with its date; days without a record are simply not there. */
  days: readonly SpanFigures[];
  /** Dates of visits after which the ram was not the ram it had been. */
  set_up_anew_on: readonly string[];
  /** A set-up span that a person stated. */
  set_up_span: { from: string; to: string } | null;
  stops: readonly Stop[];
}

export interface Examination {
  set_up_spans: SetUpSpan[];
  /** One per day: what was expected of each observable. */
  expected: DayFigures['expected'][];
  findings: Finding[];
  condition: Exclude<Condition, 'no word'>;
  sentence: string;
  /** Delivery of the last fortnight as a share of expectation. */
  delivery_against_expected: number | null;
  litres_lost_per_day: number | null;
}

const FORTNIGHT = 14;

/**
 * Examines a ram's record: what it was set up to do, what was expected of it on each day, where and when it departed from that, and why.
 * Findings are noticed day by day from the days before; only their beginnings use what came after. Linear in the days.
 */
export function examine({
  ram,
  installation,
  days,
  set_up_anew_on,
  set_up_span,
  stops,
}: ExaminationInput): Examination {
  const models = regimesOf(days, set_up_anew_on, installation.commissioned_on, set_up_span)
    .map((regime) => learn(days, regime, installation))
    .filter((model): model is RegimeModel => model !== null);
  const modelOf = (d: number) => models.find(({ regime }) => d >= regime.first && d < regime.end);
  const expected = days.map((day, d) => expectedOn(day, modelOf(d), installation));
  const series = new Map<Observable, RatioSeries>();
  for (const observable of observables) {
    const ratios = ratiosOf(days, models, observable, installation);
    if (ratios !== null) series.set(observable, ratios);
  }
  const departures: Departure[] = [...series.values()].flatMap((one) => departuresOf(one, models, series.size));
  const expectedDelivery = (d: number) => expected[d]?.delivery_l_per_day?.value ?? null;
  const lately = expected
    .slice(-FORTNIGHT)
    .flatMap((one) => (one.delivery_l_per_day === undefined ? [] : [one.delivery_l_per_day.value]));
  const findings = [
    ...findingsOf(departures, { ram, installation, days, models, series, expectedDelivery }),
    ...stopFindings(stops, ram, lately.length > 0 ? Math.round(median(lately)) : null),
  ].sort((a, b) => Number(b.open) - Number(a.open) || (a.noticed_on < b.noticed_on ? 1 : -1));
  const open = findings.filter((finding) => finding.open);
  const gravest =
    open.find((one) => one.class === 'go now') ?? open.find((one) => one.class === 'plan a visit') ?? open[0];
  const stopped = stops.some((stop) => stop.to_ms === null);
  return {
    set_up_spans: models.map(({ regime }) => regime.span),
    expected,
    findings,
    condition: stopped
      ? 'stopped'
      : gravest === undefined
        ? 'holding'
        : gravest.class === 'go now'
          ? 'failing'
          : 'slipping',
    sentence: gravest?.sentence ?? quietSentence(days, models.at(-1)),
    delivery_against_expected: againstExpected(days, expectedDelivery),
    litres_lost_per_day: gravest === undefined ? null : Math.max(0, ...open.map((one) => one.litres_lost_per_day ?? 0)),
  };
}

function expectedOn(
  day: SpanFigures,
  model: RegimeModel | undefined,
  installation: Installation,
): DayFigures['expected'] {
  const expected: DayFigures['expected'] = {};
  if (model === undefined) return expected;
  for (const observable of observables) {
    const due = dueOn(day, observable, model, installation);
    if (due !== null) expected[observable] = shownExpectation(due);
  }
  return expected;
}

function againstExpected(days: readonly SpanFigures[], expectedDelivery: (d: number) => number | null): number | null {
  const shares: number[] = [];
  for (let d = days.length - 1; d >= 0 && shares.length < FORTNIGHT && d >= days.length - 2 * FORTNIGHT; d--) {
    const arrived = arriving(days[d]!);
    const due = expectedDelivery(d);
    if (isGood(days[d]!) && due !== null && arrived !== null) shares.push(arrived / due);
  }
  return shares.length > 0 ? median(shares) : null;
}

/** Without a finding: whether there is less water than at set-up, or nothing to say, or no base yet to say it from. */
function quietSentence(days: readonly SpanFigures[], model: RegimeModel | undefined): string {
  if (model === undefined) return 'There are too few whole days yet to know what this ram should do.';
  const falls = days.slice(-FORTNIGHT).flatMap((day) => (day.fall_m === null ? [] : [day.fall_m.value]));
  const share = falls.length > 0 ? median(falls) / model.fall_m : 1;
  const provisional = model.regime.span.provisional ? ' The set-up span is still short, so this is provisional.' : '';
  if (share < 0.93)
    return `Less water, not a worse ram: the fall is ${Math.round((1 - share) * 100)} % below that of the set-up span, and the ram does what that allows.${provisional}`;
  return `The ram does what it did in its set-up span.${provisional}`;
}
