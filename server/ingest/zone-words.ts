/*
 * What a file says of its clock's zone: in the heading of the time column, or in the lines above the header.
 */
import { minutesOfOffset } from './stamps';

const offsetWords = /\b(?:UTC|GMT)\s*([+\-−]\s*\d{1,2}(?::?\d{2})?)?(?![\w/])/i;
const zoneLabel =
  /\b(time\s*zone|timezone|zone|tz|zona horaria|fuseau( horaire)?|zeitzone|fuso( hor[aá]rio)?|utc offset|gmt offset)\b/i;
const ianaName = /\b([A-Z][A-Za-z_]+\/[A-Z][A-Za-z0-9_+/-]+)\b/;

/** The zone that a heading states: 'utc', an offset such as +05:45, an IANA zone, or null where it states none. */
export function zoneOfHeading(heading: string): string | null {
  const iana = ianaName.exec(heading)?.[1];
  if (iana !== undefined && isKnown(iana)) return iana;
  const found = offsetWords.exec(heading);
  if (!found) return null;
  return found[1] === undefined ? 'utc' : offsetText(found[1]);
}

/** The zone that the preamble states, and the words of one that is not understood. */
export function zoneOfPreamble(lines: readonly string[]): { zone: string | null; unknown: string | null } {
  for (const line of lines) {
    const label = zoneLabel.exec(line);
    if (!label) continue;
    const rest = line.slice(label.index + label[0].length).replace(/^[\s:=,;|\t"]+|[\s,;|\t"]+$/g, '');
    const zone = zoneOfHeading(rest) ?? (/^[+\-−]\d{1,2}(:?\d{2})?$/.test(rest) ? offsetText(rest) : null);
    if (zone !== null) return { zone, unknown: null };
    if (rest !== '' && !/^local\b/i.test(rest)) return { zone: null, unknown: rest };
  }
  return { zone: null, unknown: null };
}

function offsetText(written: string): string {
  const minutes = minutesOfOffset(written.replace('−', '-').replace(/\s/g, ''));
  if (minutes === 0) return 'utc';
  const size = Math.abs(minutes);
  const two = (n: number) => String(n).padStart(2, '0');
  return `${minutes < 0 ? '-' : '+'}${two(Math.floor(size / 60))}:${two(size % 60)}`;
}

function isKnown(zone: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: zone });
    return true;
  } catch {
    return false;
  }
}
