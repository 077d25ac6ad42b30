/** Days since 1970-01-01 of a date of the Gregorian calendar. Source: the usual era arithmetic, checked against Date.UTC in the tests. */
export function daysSince1970(year: number, month: number, day: number): number {
  const y = month <= 2 ? year - 1 : year;
  const era = Math.floor(y / 400);
  const yearOfEra = y - era * 400;
  const dayOfYear = Math.floor((153 * (month + (month > 2 ? -3 : 9)) + 2) / 5) + day - 1;
  return (
    era * 146_097 + yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear - 719_468
  );
}

const lengths = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];

export function daysInMonth(year: number, month: number): number {
  const isLeap = year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);
  return month === 2 && isLeap ? 29 : (lengths[month - 1] ?? 0);
}

export const monthNames = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

/** How the months' names begin in English, Spanish, French, Portuguese and German, accents left out. */
const beginnings = [
  ['jan', 'ene'],
  ['feb', 'fev'],
  ['mar', 'mrz', 'maerz'],
  ['apr', 'abr', 'avr'],
  ['may', 'mai'],
  ['jun', 'juin'],
  ['jul', 'juil'],
  ['aug', 'ago', 'aou'],
  ['sep', 'set'],
  ['oct', 'okt', 'out'],
  ['nov'],
  ['dec', 'dic', 'dez'],
];

/** Month of a written name such as Apr, abril, Févr. or März; null for any other word. */
export function monthNamed(name: string): number | null {
  const plain = name.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase();
  const month = beginnings.findIndex((starts) => starts.some((start) => plain.startsWith(start)));
  return month < 0 ? null : month + 1;
}
