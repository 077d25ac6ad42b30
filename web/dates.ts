/** How a zone is called here: fixed offsets as UTC+3, places by their zone's name. */
export function zoneName(zone: string): string {
  const fixed = /^Etc\/GMT([+-])(\d{1,2})$/.exec(zone);
  // the zone database writes offsets west of Greenwich as positive
  return fixed === null ? zone : `UTC${fixed[1] === '-' ? '+' : '−'}${fixed[2]}`;
}

export function instant(iso: string, zone: string): string {
  return new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short', timeZone: zone }).format(
    new Date(iso),
  );
}

export function day(iso: string, zone = 'UTC'): string {
  return new Intl.DateTimeFormat('en-GB', { dateStyle: 'long', timeZone: zone }).format(
    new Date(iso.length === 10 ? `${iso}T12:00:00Z` : iso),
  );
}

export function shortDay(iso: string): string {
  return new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone: 'UTC' }).format(
    new Date(`${iso.slice(0, 10)}T12:00:00Z`),
  );
}

export function since(days: number): string {
  if (days < 1) return 'today';
  if (days < 2) return 'yesterday';
  return `${Math.floor(days)} days ago`;
}
