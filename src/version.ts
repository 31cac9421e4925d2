/** The package's version, as in package.json (a test compares them). */
export const VERSION = '0.1.0';

/**
 * Counts the changes that alter an output byte for the same sea. Part of every plan's hash, so that files made by
 * two programs that disagree never meet in one bake. Raise it with every such change and add a line to the
 * output-change log in DEVELOPERS.md.
 */
export const OUTPUT_VERSION = 1;

/** Printed by the README, the help footer and every manifest. */
export const CAUTION: string =
  'Imagery only. Not for navigation, coastal or offshore engineering, or any safety decision: ' +
  'those need licensed practice and local codes.';
