/** IANA zones that the browser knows, the device's own first. */
export function timeZoneOptions(): { value: string; label: string }[] {
  const own = Intl.DateTimeFormat().resolvedOptions().timeZone;
  const zones = [own, ...Intl.supportedValuesOf('timeZone').filter((zone) => zone !== own)];
  return zones.map((zone) => ({ value: zone, label: zone.replaceAll('_', ' ') }));
}

export function ownTimeZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone;
}
