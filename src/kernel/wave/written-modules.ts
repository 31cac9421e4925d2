import * as layout from './layout.ts';
import { transformSource } from './transform-source.ts';

/** The AssemblyScript modules that programs write, by name: what the build hands to the compiler. */
export function writtenModules(): Readonly<Record<string, string>> {
  return { stages: transformSource(), layout: layoutSource() };
}

/** Every number of the layout as an AssemblyScript constant. */
function layoutSource(): string {
  const { TRANSFORM_PLAN, WAVES_PLAN, STATISTICS, ...sizes } = layout;
  const numbers = Object.entries({ ...sizes, ...TRANSFORM_PLAN, ...WAVES_PLAN, ...STATISTICS });
  return numbers
    .filter(([, value]) => typeof value === 'number')
    .map(([name, value]) => `export const ${name}: usize = ${value};\n`)
    .join('');
}
