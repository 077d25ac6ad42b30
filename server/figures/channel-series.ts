import { type ChannelName, channelUnit } from '../shapes/channel';
import type { BucketSeries } from '../shapes/series';
import type { Connection } from '../store/open';
import type { StoredRam } from '../store/rams';
import { readBuckets } from '../store/series-buckets';
import { recordExtent } from '../store/series-read';
import { unitChange } from './sensors';

/** One channel of a ram, with the sensor's corrections, as at most `most` buckets of least, mean and greatest. */
export function channelSeriesOf(
  db: Connection,
  ram: StoredRam,
  channel: ChannelName,
  span: { from_ms: number | null; to_ms: number | null },
  most: number,
): BucketSeries {
  const extent = recordExtent(db, ram.id);
  const from_ms = span.from_ms ?? extent?.first_ms ?? 0;
  const to_ms = span.to_ms ?? (extent === null ? 1 : extent.last_ms + 1);
  const buckets = readBuckets(db, ram.id, channel, from_ms, to_ms, most, (name, unit) =>
    unitChange(ram.installation, name, unit),
  );
  const round = (values: (number | null)[]) =>
    values.map((value) => (value === null ? null : Number(value.toPrecision(8))));
  return {
    name: channel,
    unit: channelUnit[channel],
    from: new Date(from_ms).toISOString(),
    to: new Date(to_ms).toISOString(),
    at_ms: buckets.at_ms,
    min: round(buckets.min),
    mean: round(buckets.mean),
    max: round(buckets.max),
  };
}
