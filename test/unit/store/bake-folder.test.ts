import { createHash } from 'node:crypto';
import {
  existsSync,
  mkdirSync,
  readdirSync,
  statfsSync,
  symlinkSync,
  truncateSync,
  utimesSync,
  writeFileSync,
} from 'node:fs';
import { hostname } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { CannotCreateError, InputError, ReadWriteError } from '../../../src/errors.ts';
import { writeFileAtomic } from '../../../src/store/atomic-file.ts';
import {
  fileBytes,
  filesIn,
  fileText,
  freeBytes,
  hasFile,
  hasSize,
  isIntact,
  removeFiles,
  requireFolderPlace,
} from '../../../src/store/bake-folder.ts';
import { fillFromFiles } from '../../../src/store/scratch.ts';
import { removeOwnTemporaries, removeStaleTemporaries } from '../../../src/store/temporaries.ts';
import { temporaryName, temporaryOwner } from '../../../src/store/temporary-name.ts';
import { endedProcessId } from '../../support/foreign-process.ts';
import { withTemporaryFolder } from '../../support/foreign-program.ts';

/** Calls `body` with a folder that holds a few files. */
function withFiles(body: (folder: string) => void): void {
  withTemporaryFolder((outer) => {
    const folder = join(outer, 'bake');
    for (const path of ['manifest.json', 'c1/foam.0001.png', 'c0/foam.0002.png', 'c0/foam.0001.png']) {
      writeFileAtomic(folder, path, path);
    }
    writeFileSync(join(outer, 'outside'), '');
    body(folder);
  });
}

describe('what is in a folder', () => {
  it('is listed in one order, with / and without folders', () => {
    withFiles((folder) => {
      expect(filesIn(folder)).toEqual([
        'c0/foam.0001.png',
        'c0/foam.0002.png',
        'c1/foam.0001.png',
        'manifest.json',
      ]);
      expect(filesIn(join(folder, 'none'))).toEqual([]);
      expect(() => filesIn(join(folder, 'manifest.json'))).toThrow(ReadWriteError);
    });
  });

  it('is not followed out of it through a link', () => {
    withFiles((folder) => {
      symlinkSync('..', join(folder, 'up'));
      expect(filesIn(folder)).toContain('up');
      expect(filesIn(folder).filter((path) => path.includes('outside'))).toEqual([]);
    });
  });

  it('is found, read and hashed', () => {
    withFiles((folder) => {
      expect(hasFile(folder, 'c0/foam.0001.png')).toBe(true);
      expect(hasFile(folder, 'c0')).toBe(false);
      expect(hasFile(folder, 'c0/foam.0003.png')).toBe(false);
      expect(hasFile(folder, 'manifest.json/x')).toBe(false);
      expect(Buffer.from(fileBytes(folder, 'manifest.json')).toString()).toBe('manifest.json');
      expect(fileText(folder, 'manifest.json', 13)).toBe('manifest.json');
      expect(() => fileText(folder, 'manifest.json', 12)).toThrow(/expected at most 12 bytes, found 13/);
      expect(() => fileBytes(folder, 'none')).toThrow(
        /Cannot read .+none: there is no such file or folder \(ENOENT\)/,
      );
      expect(() => fileBytes(folder, '../outside')).toThrow(InputError);
    });
  });
});

it('the place of a folder may be empty but not another thing', () => {
  withFiles((folder) => {
    for (const path of ['.', 'c0', 'none', 'none/none']) requireFolderPlace(join(folder, path));
    for (const path of ['manifest.json', 'manifest.json/x']) {
      expect(() => requireFolderPlace(join(folder, path)), path).toThrow(CannotCreateError);
    }
  });
});

describe('a stated file', () => {
  const hex = createHash('sha256').update('manifest.json').digest('hex');
  const stated = { path: 'manifest.json', bytes: 13, sha256: `sha256:${hex}` };

  it('is intact with its size and hash, and with nothing else', () => {
    withFiles((folder) => {
      expect(isIntact(folder, stated)).toBe(true);
      expect(hasSize(folder, stated)).toBe(true);
      expect(isIntact(folder, { ...stated, bytes: 14 })).toBe(false);
      expect(isIntact(folder, { ...stated, path: 'c0/foam.0001.png' })).toBe(false);
      writeFileSync(join(folder, 'manifest.json'), 'Manifest.json');
      expect(isIntact(folder, stated)).toBe(false);
      expect(hasSize(folder, stated)).toBe(true);
    });
  });

  it('is not intact where it is missing, or a folder is in its place', () => {
    withFiles((folder) => {
      for (const path of ['none', 'none/none', 'c0', 'manifest.json/x']) {
        expect(isIntact(folder, { ...stated, path }), path).toBe(false);
        expect(hasSize(folder, { ...stated, path }), path).toBe(false);
      }
      expect(() => isIntact(folder, { ...stated, path: '../outside' })).toThrow(InputError);
    });
  });

  it('is not read where it has another size', () => {
    withFiles((folder) => {
      truncateSync(join(folder, 'manifest.json'), 2 ** 40);
      expect(isIntact(folder, stated)).toBe(false);
    });
  });
});

describe('removeFiles', () => {
  it('removes the named files and the folders that this empties, and nothing else', () => {
    withFiles((folder) => {
      writeFileSync(join(folder, 'c0', 'mine.txt'), '');
      mkdirSync(join(folder, 'empty'));
      removeFiles(folder, ['c0/foam.0001.png', 'c1/foam.0001.png', 'c9/never.png', 'manifest.json']);
      expect(filesIn(folder)).toEqual(['c0/foam.0002.png', 'c0/mine.txt']);
      expect(readdirSync(folder).sort()).toEqual(['c0', 'empty']);
    });
  });

  it('keeps the bake folder itself', () => {
    withFiles((folder) => {
      removeFiles(folder, filesIn(folder));
      expect(readdirSync(folder)).toEqual([]);
    });
  });

  it('removes nothing at all where one path leaves the folder', () => {
    withFiles((folder) => {
      expect(() => removeFiles(folder, ['manifest.json', '../outside'])).toThrow(InputError);
      expect(hasFile(folder, 'manifest.json')).toBe(true);
      expect(existsSync(join(folder, '..', 'outside'))).toBe(true);
    });
  });

  it('removes no folder in the place of a file', () => {
    withFiles((folder) => {
      expect(() => removeFiles(folder, ['c0'])).toThrow(ReadWriteError);
      expect(filesIn(folder).length).toBe(4);
    });
  });
});

describe('removeStaleTemporaries', () => {
  const random = '01234567-89ab-cdef-0123-456789abcdef';
  const named = (host: string, pid: number) => `.loopswell~${host}~${pid}~${random}.tmp`;

  const parentProcessId = process.ppid;

  /** Puts a file into the folder that has not changed for so many seconds. */
  function put(folder: string, path: string, ageS: number): void {
    writeFileAtomic(folder, path, '');
    const timeS = Date.now() / 1000 - ageS;
    utimesSync(join(folder, path), timeS, timeS);
  }

  it('takes those of dead processes here at once, and any after an hour without change', () => {
    withFiles((folder) => {
      const here = temporaryOwner(temporaryName())?.host ?? '';
      expect(here.slice(0, 5)).toBe(hostname().slice(0, 5));
      const dead = endedProcessId();
      const minutes = 60;
      put(folder, `c0/${named(here, dead)}`, 0);
      put(folder, `c0/${named(here, parentProcessId)}`, 59 * minutes);
      // An earlier process had this one's number: this one writes nothing there yet.
      put(folder, `c0/${named(here, process.pid)}`, 0);
      put(folder, `c1/${named(here, parentProcessId)}`, 61 * minutes);
      put(folder, named('elsewhere', dead), 59 * minutes);
      put(folder, named('elsewhere.example', dead), 61 * minutes);
      // Not ours, however old.
      put(folder, '.loopswell~x.tmp', 100 * minutes);
      put(folder, 'c1/foam.0001.png', 100 * minutes);
      const kept = [`c0/${named(here, parentProcessId)}`, named('elsewhere', dead), '.loopswell~x.tmp'];
      const others = filesIn(folder).filter((path) => !path.includes('~'));

      const removed = removeStaleTemporaries(folder, true);
      expect(removed.sort()).toEqual(
        [
          `c0/${named(here, dead)}`,
          `c0/${named(here, process.pid)}`,
          `c1/${named(here, parentProcessId)}`,
          named('elsewhere.example', dead),
        ].sort(),
      );
      expect(filesIn(folder)).toEqual([...others, ...kept].sort());
      expect(removeStaleTemporaries(folder, true)).toEqual([]);

      // While it writes there itself, its own are not touched.
      put(folder, `c0/${named(here, process.pid)}`, 0);
      expect(removeStaleTemporaries(folder, false)).toEqual([]);
      expect(removeStaleTemporaries(folder, true)).toHaveLength(1);
    });
  });

  it('does nothing to a folder without any, or to none', () => {
    withFiles((folder) => {
      expect(removeStaleTemporaries(folder, true)).toEqual([]);
      expect(removeStaleTemporaries(join(folder, 'none'), true)).toEqual([]);
      expect(existsSync(join(folder, 'none'))).toBe(false);
    });
  });
});

describe('removeOwnTemporaries', () => {
  it('takes those of this process and no others', () => {
    withFiles((folder) => {
      writeFileAtomic(folder, `c0/${temporaryName()}`, '');
      const others = temporaryName().replace(`~${process.pid}~`, `~${process.ppid}~`);
      writeFileAtomic(folder, others, '');
      removeOwnTemporaries(folder);
      expect(filesIn(folder).filter((path) => path.endsWith('.tmp'))).toEqual([others]);
    });
  });
});

describe('freeBytes', () => {
  it('is what the file system says, also for a folder that is not there yet', () => {
    withFiles((folder) => {
      const { bavail, bsize, blocks } = statfsSync(folder);
      const free = freeBytes(join(folder, 'not', 'yet'));
      // Others use this disk meanwhile: within 5 % of its size.
      expect(Math.abs(free - bavail * bsize)).toBeLessThan(0.05 * blocks * bsize);
      expect(free).toBeGreaterThan(0);
    });
  });
});

describe('fillFromFiles', () => {
  it('reads one stretch of each file, in order, and nothing beside it', () => {
    withTemporaryFolder((folder) => {
      const paths = ['2', '0', '1'];
      for (const path of paths)
        writeFileAtomic(
          folder,
          path,
          Uint8Array.from({ length: 50 }, (_, i) => 50 * +path + i),
        );
      const out = new Uint8Array(14).fill(255);
      fillFromFiles(out.subarray(1), folder, paths, 46, 4);
      expect([...out]).toEqual([255, 146, 147, 148, 149, 46, 47, 48, 49, 96, 97, 98, 99, 255]);
    });
  });

  it('refuses a file that ends too soon, a missing one and too little room', () => {
    withTemporaryFolder((folder) => {
      writeFileAtomic(folder, 'short', new Uint8Array(49));
      const out = new Uint8Array(4);
      expect(() => fillFromFiles(out, folder, ['short'], 46, 4)).toThrow(
        /short ends too soon: it has 3 bytes of 4/,
      );
      expect(() => fillFromFiles(out, folder, ['none'], 0, 4)).toThrow(ReadWriteError);
      expect(() => fillFromFiles(out, folder, ['short', 'short'], 0, 4)).toThrow(RangeError);
    });
  });
});
