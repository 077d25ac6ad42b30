import type { Cause } from '../shapes/finding';

/** What to look at at the ram, in order, and what to carry, for each cause. Sources: the reference's signature table and handbook lore. */
interface Advice {
  checks: string[];
  parts: string[];
}

export const adviceFor: Record<Cause, Advice> = {
  'waste valve leaking': {
    checks: [
      'While the valve is shut in its beat, look for water weeping past the seat.',
      'Stop the ram; look at rubber and seat for wear and grit.',
      'Bucket-test the delivery before and after.',
    ],
    parts: ['waste valve rubber', 'seat gasket'],
  },
  'waste valve stroke grown': {
    checks: [
      'Measure the stroke of the waste valve and compare it with the record.',
      'Look for a loose lock nut, a thinned rubber or a weak spring.',
      'Look whether the source is drawn down.',
    ],
    parts: ['lock nut', 'waste valve rubber', 'spring, if fitted'],
  },
  'waste valve stroke shrunk': {
    checks: [
      'Measure the stroke of the waste valve and compare it with the record.',
      'Look for something under the valve or a swollen rubber.',
      'Look whether the source overflows more than it did.',
    ],
    parts: ['waste valve rubber'],
  },
  'delivery valve leaking back': {
    checks: [
      'Stop the ram with the drive-pipe valve shut; watch the gauge on the chamber for five minutes: a sinking needle is a leaking delivery valve (or pipe).',
      'Listen at the delivery valve for water running back.',
      'Open it only after relieving the pressure; look at rubber and seat.',
    ],
    parts: ['delivery valve rubber', 'chamber gasket'],
  },
  'air chamber losing air': {
    checks: [
      'Listen: a hard metallic knock, a dull sound of the chamber when tapped.',
      'Look at the snifter: it should spit a little at each beat; a dry one is blocked.',
      'With the ram stopped and the chamber relieved, drain it so that it fills with air; look for leaks at its top.',
    ],
    parts: ['wire for the snifter', 'chamber gasket', 'gauge plug tape'],
  },
  'intake or drive pipe blocked': {
    checks: [
      'Look at the strainer and the intake for leaves and silt.',
      'Does the source overflow although the ram beats slowly? Then the water does not get into the pipe.',
      'Flush the drive pipe.',
    ],
    parts: ['strainer mesh', 'brush'],
  },
  'air in the drive pipe': {
    checks: [
      'Look for a whirl or bubbles over the intake: it must lie deep enough.',
      'Feel the drive pipe joints for hissing at each recoil.',
      'Is the beat irregular?',
    ],
    parts: ['pipe tape', 'joint seals'],
  },
  'delivery pipe leaking': {
    checks: [
      'Walk the delivery pipe; look for wet or green ground.',
      'Bucket-test at the ram and at the tank: the difference is the leak.',
      'With the ram stopped, does the gauge sink below the lift?',
    ],
    parts: ['pipe repair coupling', 'pipe of the delivery bore'],
  },
  'delivery pipe partly blocked': {
    checks: [
      'Compare the gauge while running with the gauge after two minutes of standing: a large difference is friction.',
      'Are all valves on the delivery fully open?',
      'Look at the pipe end and any filter at the tank.',
    ],
    parts: ['valve or filter of the delivery bore'],
  },
  'less water at the source': {
    checks: [
      'Measure the fall: from the water surface at the intake down to the waste valve outlet.',
      'Does the source still overflow? If not, the ram gets less than it could take.',
      'If the fall is lower, the ram may be sound: compare beats and delivery with what that fall should give.',
    ],
    parts: ['level or tape for the fall'],
  },
  'stopped with the waste valve open': {
    checks: [
      'Is there water at the source? Is the drive pipe full?',
      'Look for something holding the valve open.',
      'Lift the valve with a stick until the bubbles are out of the pipe, then let it go.',
    ],
    parts: ['waste valve rubber'],
  },
  'stopped with the waste valve shut': {
    checks: [
      'Push the valve down with a stick, several strokes.',
      'If it stops again: a leaking delivery valve or an empty delivery pipe gives no recoil.',
      'Watch the chamber gauge while the ram stands.',
    ],
    parts: ['delivery valve rubber'],
  },
  'stopped, source dry': {
    checks: ['Look at the source and the intake first.', 'Restart when the water is back.'],
    parts: [],
  },
  'sensor in doubt': {
    checks: [
      'Compare the sensor with a reading by hand: gauge, dipstick, counted beats.',
      'Look at cable, vent and fixing; note its zero in air.',
      'Do not touch the ram for this alone.',
    ],
    parts: ['spare sensor', 'desiccant'],
  },
  'not told by these sensors': {
    checks: [
      'Count the beats, bucket-test delivery and waste, read the gauge running and standing.',
      'Look at strainer, waste valve, snifter and delivery pipe in that order.',
    ],
    parts: [],
  },
};

/** Cautions that go with any hint that sends somebody to a ram. */
const always = [
  'Close the drive-pipe valve slowly and let the ram stop before you touch it: shutting it fast is itself a hammer blow.',
  'Keep fingers clear of the waste valve: it shuts within hundredths of a second; start it with a stick.',
  'Relieve the chamber and the delivery pipe before opening anything: the whole water column and the compressed air stand on it.',
];
const ratings = 'Never run the ram against a closed delivery; a pressure told here is not a rating of pipe or chamber.';
const drinking =
  'This tells nothing about drinking water: follow local rules and licensed or responsible practice, flush after opening, have it tested.';
const pit = 'In a pit: mind bad air and flooding; go in pairs.';

export function cautionsFor(causes: readonly Cause[]): string[] {
  const opensWater = causes.some(
    (cause) =>
      cause === 'delivery valve leaking back' ||
      cause === 'delivery pipe leaking' ||
      cause === 'air chamber losing air' ||
      cause === 'intake or drive pipe blocked',
  );
  return [...always, ratings, ...(opensWater ? [drinking] : []), pit];
}

/** Checks of the likeliest causes, without repeating one. */
export function checksFor(causes: readonly Cause[]): string[] {
  return [...new Set(causes.flatMap((cause) => adviceFor[cause].checks))];
}

export function partsFor(causes: readonly Cause[]): string[] {
  return [...new Set(causes.flatMap((cause) => adviceFor[cause].parts))];
}
