/* Geometry of tanks: volume and water surface from the depth above the floor, for every shape an installation may state. */
import type { Tank } from '../shapes/installation';
import { requireNumber } from './impossible';

/** Depth of a brimful tank above its floor, m; of a table, its last row. */
export function tankHeight_m(tank: Tank): number {
  if (tank.shape === 'lying cylinder') return tank.diameter_m;
  return tank.shape === 'table' ? tank.stages.at(-1)!.depth_m : tank.height_m;
}

/**
 * Litres in a tank at a depth above its floor. Below the floor counts as empty, above the brim as brimful.
 * A table is read along straight lines, from an empty tank at depth 0 where it starts higher. Throws RangeError on NaN.
 */
export function tankVolume_l(tank: Tank, depth_m: number): number {
  const depth = within(tank, depth_m);
  switch (tank.shape) {
    case 'upright cylinder':
      return 1000 * (Math.PI / 4) * tank.diameter_m ** 2 * depth;
    case 'box':
      return 1000 * tank.length_m * tank.width_m * depth;
    case 'lying cylinder': {
      // half-angle form of the segment: exact to the last line of water, where an arc cosine is not
      const angle = 4 * Math.asin(Math.sqrt(depth / tank.diameter_m));
      return (1000 * tank.length_m * tank.diameter_m ** 2 * (angle - Math.sin(angle))) / 8;
    }
    case 'cone frustum': {
      const [bottom, surface] = [tank.bottom_diameter_m / 2, frustumRadius(tank, depth)];
      return ((1000 * Math.PI * depth) / 3) * (bottom ** 2 + bottom * surface + surface ** 2);
    }
    case 'table': {
      const { left, right } = stagesAround(tank, depth);
      const share = (depth - left.depth_m) / (right.depth_m - left.depth_m);
      return left.volume_l + share * (right.volume_l - left.volume_l);
    }
  }
}

/**
 * Water surface of a tank at a depth, m²: litres per mm of level. 0 at the bottom and top line of a lying cylinder, where a level
 * says little about a flow. Depth is clamped as in `tankVolume_l`; throws RangeError on NaN.
 */
export function tankPlanArea_m2(tank: Tank, depth_m: number): number {
  const depth = within(tank, depth_m);
  switch (tank.shape) {
    case 'upright cylinder':
      return (Math.PI / 4) * tank.diameter_m ** 2;
    case 'box':
      return tank.length_m * tank.width_m;
    case 'lying cylinder':
      return 2 * tank.length_m * Math.sqrt(Math.max(0, depth * (tank.diameter_m - depth)));
    case 'cone frustum':
      return Math.PI * frustumRadius(tank, depth) ** 2;
    case 'table': {
      const { left, right } = stagesAround(tank, depth);
      return (right.volume_l - left.volume_l) / (right.depth_m - left.depth_m) / 1000;
    }
  }
}

/** Litres a tank holds when it starts to overflow, or brimful where no overflow is stated. */
export function tankCapacity_l(tank: Tank): number {
  return tankVolume_l(tank, tank.overflow_m ?? tankHeight_m(tank));
}

function within(tank: Tank, depth_m: number): number {
  requireNumber(depth_m, 'a depth of water', 'm');
  return Math.min(tankHeight_m(tank), Math.max(0, depth_m));
}

const frustumRadius = (tank: Extract<Tank, { shape: 'cone frustum' }>, depth_m: number): number =>
  (tank.bottom_diameter_m + ((tank.top_diameter_m - tank.bottom_diameter_m) * depth_m) / tank.height_m) / 2;

/** The rows of a table between which a depth lies. */
function stagesAround({ stages }: Extract<Tank, { shape: 'table' }>, depth_m: number) {
  const rows = stages[0]!.depth_m > 0 ? [{ depth_m: 0, volume_l: 0 }, ...stages] : stages;
  const i = Math.max(
    1,
    rows.findIndex((row) => row.depth_m >= depth_m),
  );
  return { left: rows[i - 1]!, right: rows[i]! };
}
