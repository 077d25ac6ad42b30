import type { Figure } from '../shapes/figure';

/** Columns padded to the widest cell, two blanks between; numbers stand to the right. */
export function table(head: string[], rows: string[][]): string[] {
  const width = head.map((cell, c) => Math.max(cell.length, ...rows.map((row) => (row[c] ?? '').length)));
  const right = head.map((_, c) => rows.length > 0 && rows.every((row) => /^[\d.,+\-–±%  ]*$/.test(row[c] ?? '')));
  const line = (cells: string[]) =>
    cells
      .map((cell, c) => (right[c] ? cell.padStart(width[c]!) : cell.padEnd(width[c]!)))
      .join('  ')
      .trimEnd();
  return [line(head), line(width.map((w) => '-'.repeat(w))), ...rows.map(line)];
}

/** A figure with its interval, as far as its digits carry. */
export function shown(figure: Figure | null | undefined): string {
  if (!figure) return '';
  const reach = Math.max(figure.high - figure.value, figure.value - figure.low);
  const digits = reach > 0 ? Math.max(0, Math.min(4, 1 - Math.floor(Math.log10(reach)))) : 2;
  return `${figure.value.toFixed(digits)} ± ${reach.toFixed(digits)}`;
}
