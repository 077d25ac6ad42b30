import type { Installation } from '../server/shapes/installation';
import type { Visit } from '../server/shapes/visit';
import type { RamState } from './cycle';
import { lowerRams } from './valley-lower';
import { upperRams } from './valley-upper';

type Sensor = Installation['sensors'][number];

/** A sensor as the logger sees it: the surveyed sensor, its heading in the file, its step and its noise. */
export interface LoggedSensor extends Sensor {
  heading: string;
  /** Smallest step shown, in the unit of the sensor. */
  step: number;
  /** Standard deviation of one reading, in the unit of the sensor. */
  noise: number;
  /** Readings that never were: isolated spikes a year, of this size. */
  spikes?: { a_year: number; reading: number };
  /** The reading stays where it was. */
  stuck?: { from: string; to: string };
}

/** What goes wrong. The state is changed by the physics that the fault has, scaled by its severity 0 to 1. */
export interface Fault {
  words: string;
  began_on: string;
  /** The day the severity reaches 1; it stays there. */
  full_on: string;
  repaired_on?: string;
  changes: (state: RamState, severity: number) => Partial<RamState>;
}

export interface PlannedVisit {
  /** Local time. */
  at: string;
  download?: boolean;
  actions?: Visit['actions'];
  bucket?: boolean;
  running_on_arrival?: boolean;
  parts_used?: string[];
  note: string;
  /** A pressure burst of this many seconds is taken, at this many samples a second. */
  burst?: { seconds: number; per_second: number; stamps: 'seconds' | 'absolute' };
}

/** One invented ram: its installation, its physics, its seasons, what happens to it and how its logger writes. */
export interface InventedRam {
  key: string;
  dialect: DialectName;
  installation: Omit<Installation, 'sensors' | 'time_zone' | 'fall_m'>;
  sensors: LoggedSensor[];
  state: RamState;
  /** Half the yearly swing of the fall, as a share. */
  fall_swing: number;
  /** Local days: first and last (included) of the records. */
  first: string;
  last: string;
  step_min: number;
  fault?: Fault;
  /** Stopped with the waste valve open, local times. */
  stopped?: { from: string; to: string };
  gap?: { from: string; to: string };
  /** The beat counter starts again from 0 (battery changed), local time. */
  counter_reset?: string;
  /** Share of single readings that are missing. */
  missing?: number;
  visits: PlannedVisit[];
  who: string;
}

export type DialectName =
  | 'comma, UTC stamps'
  | 'semicolon, decimal comma'
  | 'tab, days first'
  | 'quoted, months first'
  | 'bars, epoch seconds'
  | 'UTF-16, units row'
  | 'blanks'
  | 'comma, words among the records';

export const zone = { name: 'Etc/GMT-3', hours: 3 };
export const asOf = '2026-11-24T06:00:00Z';
export const valleyName = 'Ellerquin valley';
export const valley: readonly InventedRam[] = [...upperRams, ...lowerRams];
