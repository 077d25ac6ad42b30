/** Throws RangeError with a sentence unless a value is a finite number above 0. `what` carries its article: "a bore". */
export function requirePositive(value: number, what: string, unit: string): void {
  if (!(value > 0 && value < Number.POSITIVE_INFINITY))
    throw new RangeError(`${what} of ${value} ${unit}; a number above 0 was expected`);
}

/** Throws RangeError with a sentence unless a value is a finite number, 0 or above. */
export function requireNotNegative(value: number, what: string, unit: string): void {
  if (!(value >= 0 && value < Number.POSITIVE_INFINITY))
    throw new RangeError(`${what} of ${value} ${unit}; 0 or more was expected`);
}

/** Throws RangeError with a sentence unless a value is a finite number. */
export function requireNumber(value: number, what: string, unit: string): void {
  if (!Number.isFinite(value)) throw new RangeError(`${what} of ${value} ${unit}; a number was expected`);
}
