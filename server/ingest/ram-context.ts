import type { Sensor } from '../shapes/installation';
import type { FileReading } from '../shapes/reading';

/** What reading a ram's files needs to know of the ram. */
export interface RamContext {
  /** IANA zone of the ram's local time. */
  time_zone: string;
  sensors: Sensor[];
  now_ms: number;
  /** Readings that were accepted for this ram's files earlier, newest first. */
  remembered: FileReading[];
}
