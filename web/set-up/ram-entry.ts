import type { ChannelName } from '../../server/shapes/channel';
import type { Installation } from '../../server/shapes/installation';
import { typed } from '../ram/visit-entry';

export const tankShapes = ['', 'upright cylinder', 'lying cylinder', 'box', 'cone frustum'] as const;

export interface RamEntry {
  name: string;
  time_zone: string;
  fall_m: string;
  lift_m: string;
  drive_length_m: string;
  drive_bore_mm: string;
  drive_material: string;
  delivery_length_m: string;
  delivery_bore_mm: string;
  people_served: string;
  floor_l_per_day: string;
  tank_shape: (typeof tankShapes)[number];
  tank: Record<string, string>;
  sensors: ChannelName[];
  source_zero_m: string;
  chamber_gauge_m: string;
}

export const tankFields: Record<RamEntry['tank_shape'], { name: string; label: string }[]> = {
  '': [],
  'upright cylinder': [
    { name: 'diameter_m', label: 'Diameter, m' },
    { name: 'height_m', label: 'Height, m' },
    { name: 'overflow_m', label: 'Overflow above the floor, m' },
  ],
  'lying cylinder': [
    { name: 'diameter_m', label: 'Diameter, m' },
    { name: 'length_m', label: 'Length, m' },
    { name: 'overflow_m', label: 'Overflow above the floor, m' },
  ],
  box: [
    { name: 'length_m', label: 'Length, m' },
    { name: 'width_m', label: 'Width, m' },
    { name: 'height_m', label: 'Height, m' },
    { name: 'overflow_m', label: 'Overflow above the floor, m' },
  ],
  'cone frustum': [
    { name: 'bottom_diameter_m', label: 'Bottom diameter, m' },
    { name: 'top_diameter_m', label: 'Top diameter, m' },
    { name: 'height_m', label: 'Height, m' },
    { name: 'overflow_m', label: 'Overflow above the floor, m' },
  ],
};

export const sensorChoices: { channel: ChannelName; label: string }[] = [
  { channel: 'beat_count', label: 'beat counter' },
  { channel: 'chamber_pressure', label: 'chamber pressure' },
  { channel: 'chamber_ripple', label: 'chamber ripple' },
  { channel: 'source_level', label: 'source level' },
  { channel: 'tank_level', label: 'tank level' },
  { channel: 'delivery_volume', label: 'delivery meter' },
  { channel: 'waste_flow', label: 'waste flow' },
];

export const emptyRam = (): RamEntry => ({
  name: '',
  time_zone: Intl.DateTimeFormat().resolvedOptions().timeZone,
  fall_m: '',
  lift_m: '',
  drive_length_m: '',
  drive_bore_mm: '',
  drive_material: '',
  delivery_length_m: '',
  delivery_bore_mm: '',
  people_served: '',
  floor_l_per_day: '',
  tank_shape: '',
  tank: {},
  sensors: ['beat_count'],
  source_zero_m: '',
  chamber_gauge_m: '',
});

const given = (text: string | undefined): number | undefined =>
  text === undefined || Number.isNaN(typed(text)) ? undefined : typed(text);

/** What was typed as a description of the installation; the server judges it and says what is wrong. */
export function installationOf(entry: RamEntry): Partial<Installation> & object {
  const delivery = given(entry.delivery_length_m);
  return {
    name: entry.name,
    time_zone: entry.time_zone.trim(),
    fall_m: given(entry.fall_m),
    lift_m: given(entry.lift_m),
    drive_pipe: {
      length_m: given(entry.drive_length_m)!,
      bore_mm: given(entry.drive_bore_mm)!,
      ...(entry.drive_material === ''
        ? {}
        : { material: entry.drive_material as Installation['drive_pipe']['material'] }),
    },
    ...(delivery === undefined
      ? {}
      : { delivery_pipe: { length_m: delivery, bore_mm: given(entry.delivery_bore_mm)! } }),
    ...(given(entry.people_served) === undefined ? {} : { people_served: given(entry.people_served) }),
    ...(given(entry.floor_l_per_day) === undefined ? {} : { floor_l_per_day: given(entry.floor_l_per_day) }),
    ...(entry.tank_shape === '' ? {} : { tank: tankOf(entry) }),
    sensors: entry.sensors.map((channel) => ({
      channel,
      ...(channel === 'source_level' && given(entry.source_zero_m) !== undefined
        ? { height_m: given(entry.source_zero_m) }
        : {}),
      ...(channel === 'chamber_pressure' && given(entry.chamber_gauge_m) !== undefined
        ? { height_m: given(entry.chamber_gauge_m) }
        : {}),
    })),
  };
}

function tankOf({ tank_shape, tank }: RamEntry): Installation['tank'] {
  const sizes = Object.fromEntries(
    tankFields[tank_shape].map(({ name }) => [name, given(tank[name])]).filter(([, value]) => value !== undefined),
  );
  return { shape: tank_shape, ...sizes } as unknown as Installation['tank'];
}

/** The installation as far as it can be drawn; null while fall, lift or drive pipe are missing or impossible. */
export function drawable(entry: RamEntry): Installation | null {
  const whole = installationOf(entry) as Installation;
  const drawn = whole.fall_m > 0 && whole.lift_m > whole.fall_m && whole.drive_pipe.length_m >= whole.fall_m;
  if (!drawn) return null;
  const tankIsWhole =
    whole.tank !== undefined &&
    tankFields[entry.tank_shape].every(({ name }) => name === 'overflow_m' || given(entry.tank[name])! > 0);
  return { ...whole, name: whole.name || 'the ram', tank: tankIsWhole ? whole.tank : undefined };
}
