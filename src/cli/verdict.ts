import { EXIT_STATUS, LoopswellError } from '../errors.ts';
import type { VerifyReport } from '../index.ts';

/**
 * Turns a report with failed checks into the status 1.
 *
 * @throws LoopswellError naming the checks that failed
 */
export function requirePassed({ checks, passed }: VerifyReport): void {
  if (passed) return;
  const failed = checks.filter((check) => check.passed === false);
  const names = [...new Set(failed.map(({ name }) => name))].join(', ');
  const message = `${failed.length} of ${checks.length} checks failed: ${names}.`;
  throw new LoopswellError(message, EXIT_STATUS.verificationFailed);
}
