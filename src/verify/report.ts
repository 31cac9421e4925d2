import type { MeasuredStatistics } from './statistics.ts';

/** One row of a report: one question about one cascade, or about the bake as a whole. */
export interface CheckResult {
  /** Name of the check, e.g. `dispersion`; a check may have several rows. */
  readonly name: string;
  readonly question: string;
  /** Id of the cascade; null for the bake as a whole. */
  readonly cascade: string | null;
  /** The figure that was measured, in `unit`; null where there is none. */
  readonly measured: number | null;
  readonly unit: string;
  /** The check passes while the figure is not above this; null where there is none. */
  readonly limit: number | null;
  /** Why the limit is what it is; why the check does not apply where it does not. */
  readonly reason: string;
  /** null: not applicable, which is neither passed nor failed. */
  readonly passed: boolean | null;
  /** More figures and the first things that are wrong, as plain sentences. */
  readonly details: readonly string[];
}

/** What a finished bake shows of itself. Plain and JSON-able. */
export interface VerifyReport {
  readonly title: string;
  readonly planHash: string;
  /** In the order of the registry, then of the cascades. */
  readonly checks: readonly CheckResult[];
  /** What the files hold, measured; see its type. Null where the checks were the quick ones or some frames only. */
  readonly statistics: MeasuredStatistics | null;
  /** No check failed. */
  readonly passed: boolean;
}
