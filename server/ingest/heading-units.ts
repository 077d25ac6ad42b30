/*
 * Units that stand in a column's heading: "Chamber p [bar]", "Tank level (cm)", "Delivery pressure kPa", "Level,m", "p / kPa".
 */
import { parseUnit, type UnitName } from '../units/units';

export interface HeadingUnit {
  unit: UnitName;
  /** True in brackets or after a mark; a bare last word may be a word: "flow in", "level m". */
  isMarked: boolean;
  /** The heading without its unit. */
  words: string;
}

/** Every reading of a heading that has a unit in it, the surest first. */
export function headingUnits(label: string): HeadingUnit[] {
  const found: HeadingUnit[] = [];
  const add = (text: string, isMarked: boolean, words: string) => {
    const unit = text.trim() === '' ? null : parseUnit(text.trim());
    if (unit !== null) found.push({ unit, isMarked, words: words.trim() });
  };
  for (const bracket of label.matchAll(/[([{]([^()[\]{}]*)[)\]}]/g)) {
    const without = label.replace(bracket[0], ' ');
    add(bracket[1]!, true, without);
    for (const part of bracket[1]!.split(/[,; ]/)) if (part !== bracket[1]) add(part, true, without);
  }
  const marked = /^(.*?)(?:\s*[,:;|]\s*|\s+[/-]\s+|\s+in\s+)([^,:;]+)$/i.exec(label);
  if (marked) add(marked[2]!, true, marked[1]!);
  const words = label.split(/[\s_]+/);
  for (let count = Math.min(4, words.length - 1); count >= 1; count--)
    add(words.slice(-count).join(' '), false, words.slice(0, -count).join(' '));
  return found;
}
