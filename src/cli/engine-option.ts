import { Option } from 'commander';
import { ENGINE_NAMES, PLAN_DEFAULTS } from '../index.ts';

/** `--engine`, for commands that plan a sea. */
export function engineOption(): Option {
  return new Option('--engine <name>', 'what makes the frames; a saved plan has its own')
    .choices(ENGINE_NAMES)
    .default(undefined, PLAN_DEFAULTS.engine);
}
