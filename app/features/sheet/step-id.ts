/** A random id (UUID, version 4) for a new line; also where the browser has no `crypto.randomUUID`, on plain http. */
export function newStepId(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  const at = (i: number) => bytes[i] ?? 0;
  bytes[6] = (at(6) & 0x0f) | 0x40;
  bytes[8] = (at(8) & 0x3f) | 0x80;
  const hex = [...bytes].map((byte) => byte.toString(16).padStart(2, '0')).join('');
  return [hex.slice(0, 8), hex.slice(8, 12), hex.slice(12, 16), hex.slice(16, 20), hex.slice(20)].join('-');
}
