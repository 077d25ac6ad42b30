import { z } from 'zod';
import { channelName } from './channel';

const positive = (what: string, unit: string, most: number) =>
  z
    .number({ error: `${what} must be a number of ${unit}` })
    .gt(0, { error: (issue) => `${what} is ${issue.input}; it must be above 0 ${unit}` })
    .lte(most, { error: (issue) => `${what} is ${issue.input}; more than ${most} ${unit} is not believed` });

export const pipeMaterial = z.enum(['steel', 'ductile iron', 'cast iron', 'copper', 'PVC-U', 'HDPE', 'concrete']);
export type PipeMaterial = z.infer<typeof pipeMaterial>;

export const pipe = z.object({
  length_m: positive('pipe length', 'm', 20_000),
  bore_mm: positive('bore', 'mm', 1_000),
  wall_mm: positive('wall', 'mm', 100).optional(),
  material: pipeMaterial.optional(),
});

export const tank = z.discriminatedUnion('shape', [
  z.object({
    shape: z.literal('upright cylinder'),
    diameter_m: positive('tank diameter', 'm', 100),
    height_m: positive('tank height', 'm', 50),
    overflow_m: positive('overflow height', 'm', 50).optional(),
  }),
  z.object({
    shape: z.literal('lying cylinder'),
    diameter_m: positive('tank diameter', 'm', 20),
    length_m: positive('tank length', 'm', 100),
    overflow_m: positive('overflow height', 'm', 50).optional(),
  }),
  z.object({
    shape: z.literal('box'),
    length_m: positive('tank length', 'm', 200),
    width_m: positive('tank width', 'm', 200),
    height_m: positive('tank height', 'm', 50),
    overflow_m: positive('overflow height', 'm', 50).optional(),
  }),
  z.object({
    shape: z.literal('cone frustum'),
    bottom_diameter_m: positive('bottom diameter', 'm', 100),
    top_diameter_m: positive('top diameter', 'm', 100),
    height_m: positive('tank height', 'm', 50),
    overflow_m: positive('overflow height', 'm', 50).optional(),
  }),
  z.object({
    shape: z.literal('table'),
    stages: z
      .array(z.object({ depth_m: z.number().min(0), volume_l: z.number().min(0) }))
      .min(2)
      .meta({ description: 'Depth and volume pairs, both rising.' }),
    overflow_m: positive('overflow height', 'm', 50).optional(),
  }),
]);
export type Tank = z.infer<typeof tank>;

/** A sensor of the installation: what it measures, in which unit, where its zero lies. */
export const sensor = z.object({
  channel: channelName,
  unit: z.string().max(20).optional().meta({
    description: "Unit of the sensor's readings, such as kPa, bar, psi, m, cm, L, m3, gal. A file's own unit wins.",
  }),
  height_m: z.number().min(-100).max(1000).optional().meta({
    description:
      'Height of the sensor (pressure) or of the gauge zero (source level) above the waste valve outlet; for tank_level above the tank floor; for waste_weir_head above the notch vertex (negative below).',
  }),
  offset: z.number().optional().meta({ description: 'Added to every reading, in the unit of the sensor.' }),
  scale: z
    .number()
    .gt(0)
    .optional()
    .meta({ description: 'Multiplies every reading before the offset, such as litres a pulse.' }),
  reference: z
    .enum(['gauge', 'absolute'])
    .optional()
    .meta({ description: 'Pressure against the air outside (gauge, the default) or against vacuum.' }),
  accuracy: z.number().gt(0).optional().meta({ description: 'Plus or minus at 95 %, in the unit of the sensor.' }),
  place: z
    .enum(['ram', 'tank'])
    .optional()
    .meta({ description: 'Where a delivery meter sits; at the ram unless stated.' }),
  rolls_over_at: z
    .number()
    .int()
    .gt(1)
    .optional()
    .meta({ description: 'Counters: the count at which it starts again from 0, such as 65536.' }),
});
export type Sensor = z.infer<typeof sensor>;

const zoneIsKnown = (zone: string): boolean => {
  try {
    new Intl.DateTimeFormat('en', { timeZone: zone });
    return true;
  } catch {
    return false;
  }
};

/** One ram and everything around it, as surveyed. Heights are above the waste valve outlet. */
export const installation = z
  .object({
    name: z.string().trim().min(1, { error: 'name must not be empty' }).max(80),
    time_zone: z.string().refine(zoneIsKnown, {
      error: (issue) => `time_zone "${issue.input}" is not an IANA zone; expected one such as Africa/Nairobi`,
    }),
    place: z.string().max(200).optional().meta({ description: 'How to get there, in words.' }),
    altitude_m: z.number().min(-400).max(6000).optional(),
    water_temperature_c: z.number().min(0).max(60).optional(),
    commissioned_on: z.iso.date().optional(),
    serves: z.string().max(200).optional().meta({ description: 'Who or what depends on the water, in words.' }),
    people_served: z.number().int().min(0).max(100_000).optional(),
    floor_l_per_day: z
      .number()
      .gt(0)
      .optional()
      .meta({ description: "The owner's floor: the least delivery that is still enough." }),
    fall_m: positive('fall_m', 'm', 60),
    lift_m: positive('lift_m', 'm', 500),
    drive_pipe: pipe,
    delivery_pipe: pipe.optional(),
    waste_valve: z
      .object({
        stroke_mm: positive('stroke', 'mm', 200).optional(),
        weight_g: positive('weight', 'g', 50_000).optional(),
      })
      .optional(),
    chamber: z.object({ volume_l: positive('chamber volume', 'L', 5_000) }).optional(),
    tank: tank.optional(),
    waste_weir: z
      .object({
        notch_deg: z.number().min(20).max(100).meta({ description: 'Full angle of the thin-plate V-notch, degrees.' }),
      })
      .optional(),
    sensors: z.array(sensor).max(40).default([]),
  })
  .superRefine((ram, context) => {
    if (ram.fall_m >= ram.lift_m)
      context.addIssue({
        code: 'custom',
        path: ['lift_m'],
        message: `the fall (${ram.fall_m} m) is not below the lift (${ram.lift_m} m); a ram lifts water above its source, both measured from the waste valve outlet`,
      });
    if (ram.drive_pipe.length_m < ram.fall_m)
      context.addIssue({
        code: 'custom',
        path: ['drive_pipe', 'length_m'],
        message: `a drive pipe of ${ram.drive_pipe.length_m} m cannot reach down a fall of ${ram.fall_m} m`,
      });
    if (ram.waste_weir === undefined && ram.sensors.some((s) => s.channel === 'waste_weir_head'))
      context.addIssue({
        code: 'custom',
        path: ['waste_weir'],
        message: 'a waste_weir_head sensor needs waste_weir.notch_deg',
      });
    if (ram.tank?.shape === 'table') {
      const falling = ram.tank.stages.findIndex(
        (s, i, all) => i > 0 && (s.depth_m <= all[i - 1]!.depth_m || s.volume_l <= all[i - 1]!.volume_l),
      );
      if (falling > 0)
        context.addIssue({
          code: 'custom',
          path: ['tank', 'stages', falling],
          message: 'depth and volume must both rise from row to row',
        });
    }
  });
export type Installation = z.infer<typeof installation>;
