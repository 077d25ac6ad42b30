import { type Dimension, factors, temperatures, type UnitName } from './factors';
import { unitSpelled } from './spellings';

export type { UnitName } from './factors';

interface Line {
  dimension: Dimension;
  /** Base unit of the dimension = value × scale + offset. */
  scale: number;
  offset: number;
}

const lines = new Map<string, Line>();
for (const [dimension, sizes] of Object.entries(factors) as [Dimension, Record<string, number>][])
  for (const [unit, scale] of Object.entries(sizes)) lines.set(unit, { dimension, scale, offset: 0 });
for (const [unit, line] of Object.entries(temperatures)) lines.set(unit, { dimension: 'temperature', ...line });

function lineOf(unit: UnitName): Line {
  const line = lines.get(unit);
  if (line === undefined)
    throw new RangeError(`"${unit}" is not a unit of the program; one such as kPa, m or L/s was expected`);
  return line;
}

/**
 * The unit meant by what a logger or a person writes in a header, a unit row or a form: `KPA`, `m WC`, `m³/hr`, `deg C`, `PSIG`.
 *
 * A unit alone is expected, brackets around it allowed; null where the text is none of the program's units or could be two that differ.
 * Gallons are US gallons unless `imp` or `UK` is said. Capitals matter only where they must: `ML` is a megalitre and thus unknown.
 * Gauge and absolute are dropped. Common practice, no source.
 */
export function parseUnit(text: string): UnitName | null {
  return lines.has(text) ? (text as UnitName) : unitSpelled(text);
}

/** What a unit measures. Throws RangeError for a name that is no unit. */
export function dimensionOf(unit: UnitName): Dimension {
  return lineOf(unit).dimension;
}

/**
 * The straight line that turns values of one unit into another: value × scale + offset. For work on whole columns.
 *
 * Throws RangeError where the two measure different things. Pressure and length are different things here: a metre as a height
 * becomes a pressure only with a density (hydraulics/heads), while mH2O and ftH2O are pressures of conventional water.
 */
export function converter(from: UnitName, to: UnitName): { scale: number; offset: number } {
  const [have, want] = [lineOf(from), lineOf(to)];
  if (have.dimension !== want.dimension)
    throw new RangeError(`${from} (${have.dimension}) cannot become ${to} (${want.dimension})`);
  return { scale: have.scale / want.scale, offset: (have.offset - want.offset) / want.scale };
}

/** A value in another unit. NaN stays NaN. Throws RangeError where the units measure different things. */
export function convert(value: number, from: UnitName, to: UnitName): number {
  const { scale, offset } = converter(from, to);
  return value * scale + offset;
}
