import type { Installation } from '../../server/shapes/installation';

export interface Point {
  x: number;
  y: number;
}

/** A long-section laid out on paper: where each part stands, and the scales that were used. */
export interface LongSection {
  width: number;
  height: number;
  /** Waste valve outlet: the datum from which all heights are measured. */
  valve: Point;
  source: Point;
  outlet: Point;
  tank: { left: number; right: number; floor: number; brim: number; lying: boolean };
  ground: number;
  /** Pixels per metre: upwards, along the drive pipe and along the delivery pipe. */
  upwards: number;
  drive: number;
  delivery: number;
  /** False where the installation does not state the delivery pipe's length and a slope was assumed. */
  deliveryIsStated: boolean;
}

const DRIVE_SHARE = 0.36;
/** Slope of a delivery pipe whose length nobody stated. */
const ASSUMED_RUN_PER_LIFT = 4;

const run = (length_m: number, rise_m: number): number => Math.sqrt(Math.max(0, length_m ** 2 - rise_m ** 2));

/** Height of a tank's walls, m. */
export function tankHeight(tank: Installation['tank']): number {
  if (tank === undefined) return 1;
  if (tank.shape === 'lying cylinder') return tank.diameter_m;
  return tank.shape === 'table' ? tank.stages.at(-1)!.depth_m : tank.height_m;
}

function tankWidth(tank: Installation['tank']): number {
  if (tank === undefined) return 1.5;
  switch (tank.shape) {
    case 'upright cylinder':
      return tank.diameter_m;
    case 'cone frustum':
      return Math.max(tank.bottom_diameter_m, tank.top_diameter_m);
    case 'table':
      return 2;
    default:
      return tank.length_m;
  }
}

/**
 * Lays the installation out between margins. Heights share one scale; along the pipes the drive side and the delivery side have each their own,
 * because a delivery pipe is often twenty times as long as the drive pipe.
 */
export function layOut(
  installation: Installation,
  width: number,
  height: number,
  margin: { top: number; right: number; bottom: number; left: number },
): LongSection {
  const { fall_m, lift_m, drive_pipe, delivery_pipe, tank } = installation;
  const wall_m = tankHeight(tank);
  const inner = { width: width - margin.left - margin.right, height: height - margin.top - margin.bottom };
  const upwards = inner.height / (lift_m + wall_m);
  const driveRun = Math.max(run(drive_pipe.length_m, fall_m), 0.1);
  const deliveryIsStated = delivery_pipe !== undefined && delivery_pipe.length_m >= lift_m;
  const deliveryRun = deliveryIsStated
    ? Math.max(run(delivery_pipe.length_m, lift_m), lift_m * 0.2)
    : lift_m * ASSUMED_RUN_PER_LIFT;
  const drive = (inner.width * DRIVE_SHARE) / driveRun;
  const tankPixels = Math.max(34, Math.min(inner.width * 0.14, tankWidth(tank) * upwards));
  const delivery = (inner.width * (1 - DRIVE_SHARE) - tankPixels) / deliveryRun;
  const ground = margin.top + inner.height;
  const valve = { x: margin.left + driveRun * drive, y: ground };
  const outlet = { x: valve.x + deliveryRun * delivery, y: ground - lift_m * upwards };
  return {
    width,
    height,
    valve,
    source: { x: margin.left, y: ground - fall_m * upwards },
    outlet,
    tank: {
      left: outlet.x,
      right: outlet.x + tankPixels,
      floor: outlet.y,
      brim: outlet.y - Math.max(12, wall_m * upwards),
      lying: tank?.shape === 'lying cylinder',
    },
    ground,
    upwards,
    drive,
    delivery,
    deliveryIsStated,
  };
}

/** How much heights are stretched against lengths on one side, as people write it. */
export function stretched(upwards: number, along: number): string {
  const times = upwards / along;
  if (times > 0.95 && times < 1.05) return 'heights and lengths alike';
  return times >= 1
    ? `heights × ${times >= 10 ? Math.round(times) : times.toFixed(1)}`
    : `lengths × ${1 / times >= 10 ? Math.round(1 / times) : (1 / times).toFixed(1)}`;
}
