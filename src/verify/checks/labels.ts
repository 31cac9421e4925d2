import { ATTRIBUTE_PREFIX } from '../../codec/codec.ts';
import { LARGEST_CODE } from '../../image/image.ts';
import type { Manifest, ManifestCascade, ManifestChannel, ManifestMap } from '../../manifest/manifest.ts';
import type { Check } from '../check.ts';
import type { SeenFile, SeenFrame } from '../frame-reader.ts';
import { firstOf, verdict } from '../verdict.ts';

/**
 * What each file says of itself: its cascade, frame, plan, patch length and how to decode it. A file that was moved or
 * renamed, or a manifest that was edited, shows here even where its hash was made to fit.
 */
export const LABELS: Check = {
  name: 'labels',
  question: 'Does every file say of itself what the manifest says of it?',
  quick: true,
  begin({ manifest }) {
    return {
      cascade({ cascade }) {
        const faults: string[] = [];
        let files = 0;
        return {
          frame(frame) {
            for (const file of frame.files) {
              if (file.image === null) continue;
              files++;
              faults.push(
                ...labelFaults(file, frame, manifest, cascade).map((fault) => `${file.path}: ${fault}`),
              );
            }
          },
          verdicts() {
            const reason = 'a file that is found alone must read as it does in its bake';
            const details = [`${files} files read`, ...firstOf(faults)];
            return [verdict(faults.length, { limit: 0, unit: 'faults', reason }, details)];
          },
        };
      },
    };
  },
};

function labelFaults(
  { image, planned }: SeenFile,
  { number }: SeenFrame,
  manifest: Manifest,
  cascade: ManifestCascade,
): readonly string[] {
  const attributes = image?.attributes ?? new Map<string, string | number>();
  const own = (key: string): string | number | undefined => attributes.get(ATTRIBUTE_PREFIX + key);
  const exr = planned.format === 'exr';
  const faults: string[] = [];
  const expect = (what: string, wanted: string | number, found: string | number | undefined): void => {
    if (!isSame(wanted, found)) faults.push(`it says ${what} ${found ?? 'nothing'}, not ${wanted}`);
  };
  expect('frame', number, exr ? attributes.get('imageCounter') : own('frameNumber'));
  expect('colour', 'data', exr ? attributes.get('colorInteropID') : own('colorSpace'));
  expect('cascade', cascade.id, own('cascade'));
  expect('patch length', cascade.patchLengthM, own('patchLengthM'));
  expect('frame count', cascade.loop.frameCount, own('frameCount'));
  expect('plan', manifest.planHash, own('planHash'));
  for (const channel of planned.channels) {
    const rule = String(own(`decode.${channel.name}`) ?? '');
    if (!isRule(rule, channel, planned))
      faults.push(`its rule for ${channel.name} is not the manifest's: ${rule}`);
  }
  return faults;
}

/** Whether a label is a text or number of the manifest; EXR keeps numbers to binary32, PNG keeps their text. */
function isSame(wanted: string | number, found: string | number | undefined): boolean {
  if (typeof wanted === 'string' || found === undefined) return wanted === found;
  const value = typeof found === 'number' ? found : found === '' ? Number.NaN : Number(found);
  return Math.abs(value - wanted) <= 2 ** -24 * Math.abs(wanted);
}

const RULE = /^(\S+)(?: in (\S+))? = (stored|code \/ \d+) \* (\S+) ([+-]) (\S+)$/;

/** Whether a sentence such as `displacement-up in m = code / 65535 * 12 - 6` is the manifest's rule for a channel. */
function isRule(
  sentence: string,
  { quantity, unit, decode }: ManifestChannel,
  { sample }: ManifestMap,
): boolean {
  const parts = RULE.exec(sentence);
  if (parts === null) return false;
  const [, name, unitWord = '1', stored, scale, sign, offset] = parts;
  const storedAs = sample === 'uint8' || sample === 'uint16' ? `code / ${LARGEST_CODE[sample]}` : 'stored';
  return (
    name === quantity &&
    unitWord === unit &&
    stored === storedAs &&
    Number(scale) === decode.scale &&
    Number(`${sign}${offset}`) === decode.offset
  );
}
