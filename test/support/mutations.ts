import fc from 'fast-check';

// Files that went wrong: changed in a value, cut short, with bits flipped. For anything that is read from shared disks.

type Json = null | boolean | number | string | readonly Json[] | { readonly [key: string]: Json };

/** What may stand where something else should: numbers too large, paths that lead away, the wrong type. */
const anyValue: fc.Arbitrary<Json> = fc.oneof(
  fc.constantFrom<Json>(
    null,
    true,
    '',
    0,
    -1,
    1.5,
    1e308,
    -1e308,
    5e-324,
    2 ** 31,
    2 ** 53,
    100_000,
    [],
    {},
    'Infinity',
    '../../../../../../etc/passwd',
    '/etc/passwd',
    'C:\\Windows',
    'c0/../../escaped',
    '%0999999999d',
    '%s%n',
    '\u0000',
    '\u001b[2J',
    '__proto__',
    'sha256:0000000000000000000000000000000000000000000000000000000000000000',
  ),
  fc.integer(),
  fc.double({ noNaN: true, noDefaultInfinity: true }),
  fc.string({ maxLength: 20 }),
  fc.jsonValue({ maxDepth: 3 }) as fc.Arbitrary<Json>,
);

/** One change: at a place picked by `at`, a value is replaced, removed, added beside or moved. */
interface Change {
  readonly at: number;
  readonly how: 'replace' | 'remove' | 'add' | 'double' | 'swap';
  readonly value: Json;
  readonly key: string;
}

const change: fc.Arbitrary<Change> = fc.record({
  at: fc.double({ min: 0, max: 0.999999, noNaN: true }),
  how: fc.constantFrom('replace', 'replace', 'replace', 'remove', 'add', 'double', 'swap'),
  value: anyValue,
  key: fc.constantFrom('extra', '__proto__', 'constructor', 'path', 'toString', 'length', '0'),
});

/** A document with one to three values changed. */
export function changedDocument(document: unknown): fc.Arbitrary<unknown> {
  return fc
    .array(change, { minLength: 1, maxLength: 3 })
    .map((changes) =>
      changes.reduce((value, next) => changed(value, next), structuredClone(document) as Json),
    );
}

/** A text with a stretch replaced, removed or doubled, or cut short. */
export function changedText(text: string): fc.Arbitrary<string> {
  return fc
    .record({
      from: fc.nat(text.length),
      length: fc.oneof(fc.nat(8), fc.nat(text.length)),
      by: fc.oneof(
        fc.constant(''),
        fc.string({ maxLength: 12 }),
        fc.string({ unit: 'binary', maxLength: 4 }),
      ),
      how: fc.constantFrom('replace', 'cut', 'double'),
    })
    .map(({ from, length, by, how }) => {
      if (how === 'cut') return text.slice(0, from);
      if (how === 'double') return text.slice(0, from + length) + text.slice(from);
      return text.slice(0, from) + by + text.slice(from + length);
    });
}

function changed(document: Json, { at, how, value, key }: Change): Json {
  const places = placesOf(document);
  if (places.length === 0) return value;
  const place = places[Math.floor(at * places.length)];
  const { parent } = place;
  if (how === 'replace') define(parent, place.key, value);
  else if (how === 'remove') {
    if (Array.isArray(parent)) parent.splice(Number(place.key), 1);
    else Reflect.deleteProperty(parent, place.key);
  } else if (how === 'add') {
    if (Array.isArray(parent)) parent.push(value);
    else define(parent, key, value);
  } else if (how === 'double') {
    if (Array.isArray(parent)) parent.push(parent[Number(place.key)]);
    else define(parent, `${place.key}${place.key}`, (parent as Record<string, Json>)[place.key]);
  } else {
    const other = places[(Math.floor(at * 7919 * places.length) + 1) % places.length];
    // A parent moved into its own child would go round in a circle.
    if (isScalar(valueAt(place)) && isScalar(valueAt(other))) {
      const kept = valueAt(place);
      define(parent, place.key, valueAt(other));
      define(other.parent, other.key, kept);
    }
  }
  return document;
}

interface Place {
  readonly parent: object;
  readonly key: string;
}

function valueAt({ parent, key }: Place): Json {
  return (parent as Record<string, Json>)[key];
}

function isScalar(value: Json): boolean {
  return typeof value !== 'object' || value === null;
}

/** Sets a key as JSON.parse does: `__proto__` is a key like any other. */
function define(parent: object, key: string, value: Json): void {
  Object.defineProperty(parent, key, { value, writable: true, enumerable: true, configurable: true });
}

/** Every place of a document that holds a value. */
function placesOf(value: Json): Place[] {
  if (typeof value !== 'object' || value === null) return [];
  return Object.keys(value).flatMap((key) => {
    const place = { parent: value as object, key };
    return [place, ...placesOf(valueAt(place))];
  });
}
