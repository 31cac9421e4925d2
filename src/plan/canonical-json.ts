/**
 * JSON with one spelling: keys in the order the object has them, no white space unless asked for, `Infinity` (deep
 * water, unlimited fetch) as the string "Infinity", which `JSON.parse` with `reviveInfinity` turns back.
 *
 * @throws TypeError for NaN, which has no place in a plan or manifest
 */
export function canonicalJson(value: unknown, indent = 0): string {
  const replacer = (key: string, item: unknown): unknown => {
    if (typeof item !== 'number' || Number.isFinite(item)) return item;
    if (item === Infinity) return 'Infinity';
    throw new TypeError(`${key || 'value'} is ${item}`);
  };
  return JSON.stringify(value, replacer, indent);
}

/**
 * Reviver for `JSON.parse` that undoes what `canonicalJson` does to `Infinity`, in lengths only (keys that end in `M`):
 * a title or a name may be that word.
 */
export function reviveInfinity(key: string, value: unknown): unknown {
  return value === 'Infinity' && key.endsWith('M') ? Infinity : value;
}
