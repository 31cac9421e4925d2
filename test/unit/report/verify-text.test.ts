import { expect, it } from 'vitest';
import { verifyReportLines } from '../../../src/report/verify-text.ts';
import type { CheckResult } from '../../../src/verify/report.ts';

const CHECK: CheckResult = {
  name: 'dispersion',
  question: 'Does every wave move as it should?',
  cascade: 'c0',
  measured: 4.25e-8,
  unit: 'of the variance',
  limit: 6.4e-8,
  reason: 'rounding',
  passed: true,
  details: ['a detail'],
};

const REPORT = { title: 'A sea', planHash: 'sha256:0', statistics: null, passed: true };

it('a passed check is a line, a failed one tells why, one that does not apply says so', () => {
  const lines = verifyReportLines({
    ...REPORT,
    passed: false,
    checks: [
      CHECK,
      { ...CHECK, name: 'foam', cascade: null, measured: 1234.5678, limit: 2, unit: '%', passed: false },
      { ...CHECK, name: 'foam', measured: null, limit: null, passed: null, reason: 'there is no foam map' },
      { ...CHECK, name: 'spot', measured: null, passed: false, details: [] },
    ],
  });
  expect(lines).toEqual([
    'A sea',
    '',
    'ok    dispersion  c0    Does every wave move as it should?  4.25e-8 of at most 6.40e-8 of the variance',
    'FAIL  foam        bake  Does every wave move as it should?  1235 of at most 2 %',
    '      rounding',
    '      a detail',
    '-     foam        c0    Does every wave move as it should?  not applicable',
    '      there is no foam map',
    'FAIL  spot        c0    Does every wave move as it should?  no number, at most 6.40e-8 of the variance',
    '      rounding',
    '',
    '1 passed, 2 failed, 1 not applicable: foam, spot.',
  ]);
});

it('a sound bake ends with the sum', () => {
  expect(verifyReportLines({ ...REPORT, checks: [CHECK] }).at(-1)).toBe(
    '1 passed, 0 failed, 0 not applicable.',
  );
});
