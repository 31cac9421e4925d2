import type { Check } from './check.ts';
import { DERIVATIVES } from './checks/derivatives.ts';
import { DIRECTION } from './checks/direction.ts';
import { DISPERSION } from './checks/dispersion.ts';
import { FIGURES } from './checks/figures.ts';
import { FILES } from './checks/files.ts';
import { FOAM } from './checks/foam.ts';
import { HEIGHTS } from './checks/heights.ts';
import { HORIZONTAL } from './checks/horizontal.ts';
import { LABELS } from './checks/labels.ts';
import { LOOP } from './checks/loop.ts';
import { SEA } from './checks/sea.ts';
import { SPECTRUM } from './checks/spectrum.ts';
import { SPOT } from './checks/spot.ts';
import { TILE } from './checks/tile.ts';
import { WAVES } from './checks/waves.ts';

/** Every check there is, in the order of the report: a new one is a file in `checks/` and a line here. */
export const CHECKS: readonly Check[] = [
  FILES,
  LABELS,
  SEA,
  WAVES,
  FIGURES,
  LOOP,
  TILE,
  HEIGHTS,
  DISPERSION,
  DIRECTION,
  SPECTRUM,
  HORIZONTAL,
  DERIVATIVES,
  FOAM,
  SPOT,
];
