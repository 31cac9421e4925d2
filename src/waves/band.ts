/**
 * One end of a cascade's band: a smooth border in ln k, centred on `kRadPerM`, that reaches from k/fade to k*fade.
 * A fade of 1 is a hard edge.
 */
export interface BandBorder {
  readonly kRadPerM: number;
  readonly fade: number;
}

/** The wavenumbers a cascade carries. `low: null` has no lower limit but the patch itself. */
export interface Band {
  readonly low: BandBorder | null;
  readonly high: BandBorder;
}

/** Cubic smoothstep 3t^2 - 2t^3, clamped outside [0, 1]. */
export function smoothstep(t: number): number {
  const u = Math.min(1, Math.max(0, t));
  return u * u * (3 - 2 * u);
}

/**
 * Share of the energy above a border: 0 below k/F, 1 above kF.
 *
 *     up(k) = smoothstep(1/2 + ln(k/b) / (2 ln F))
 *
 * Of two cascades that share a border the finer takes up(k) and the longer leaves it, so every wavenumber is counted
 * once.
 */
export function energyAbove(kRadPerM: number, border: BandBorder): number {
  const { kRadPerM: b, fade: F } = border;
  if (F <= 1) return kRadPerM < b ? 0 : 1;
  return smoothstep(0.5 + Math.log(kRadPerM / b) / (2 * Math.log(F)));
}

/**
 * Energy weight of a band at a wavenumber (rad/m), 0..1: what passes its low border and not its high one,
 *
 *     w(k) = up_low(k) - up_high(k)
 *
 * Summed over neighbours this telescopes to 1 however the borders overlap, as long as they come in order
 * (a product of the two would count overlaps of three bands twice).
 */
export function bandWeight(kRadPerM: number, band: Band): number {
  const above = band.low === null ? 1 : energyAbove(kRadPerM, band.low);
  return above === 0 ? 0 : Math.max(0, above - energyAbove(kRadPerM, band.high));
}

/** Smallest and largest wavenumber at which a band weighs anything, rad/m. */
export function bandLimits(band: Band): { readonly kMinRadPerM: number; readonly kMaxRadPerM: number } {
  return {
    kMinRadPerM: band.low === null ? 0 : band.low.kRadPerM / band.low.fade,
    kMaxRadPerM: band.high.kRadPerM * band.high.fade,
  };
}
