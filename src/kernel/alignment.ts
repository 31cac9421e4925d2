/** The next multiple of 64 bytes, a cache line. */
export function roundedUp64(bytes: number): number {
  return Math.ceil(bytes / 64) * 64;
}
