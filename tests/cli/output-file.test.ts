import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { readInputFile } from '../../src/cli/input-file.ts';
import { outputProblems, writeNewFile, writeOutputFile } from '../../src/cli/output-file.ts';
import { ProblemError } from '../../src/errors/problem.ts';

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-output-'));
});
afterAll(() => rmSync(folder, { recursive: true }));

describe('files written', () => {
  test('replace an older one whole, keep its mode, and leave nothing else behind', () => {
    const path = join(folder, 'a.json');
    writeFileSync(path, 'old', { mode: 0o640 });
    writeOutputFile(path, 'new');
    expect(readFileSync(path, 'utf8')).toBe('new');
    expect(statSync(path).mode & 0o777).toBe(0o640);
    expect(readdirSync(folder)).toEqual(['a.json']);
  });

  test('go through a symbolic link to its target', () => {
    const [target, link] = [join(folder, 'target'), join(folder, 'link')];
    writeFileSync(target, 'old');
    symlinkSync(target, link);
    writeOutputFile(link, 'new');
    expect(readFileSync(target, 'utf8')).toBe('new');
  });

  test('a device is written to and not replaced', () => {
    writeOutputFile('/dev/null', 'text');
    expect(statSync('/dev/null').isCharacterDevice()).toBe(true);
  });

  test('a folder in place of the file, and a missing folder, are problems, seen beforehand too', () => {
    const missing = join(folder, 'none', 'x');
    for (const path of [folder, missing]) {
      expect(() => writeOutputFile(path, 'x')).toThrow(ProblemError);
      expect(outputProblems(path)).toHaveLength(1);
    }
    expect(outputProblems(join(folder, 'new.json'))).toEqual([]);
  });

  test('a new file never replaces one', () => {
    const path = join(folder, 'sheet.yaml');
    writeNewFile(path, 'one');
    expect(() => writeNewFile(path, 'two')).toThrow(ProblemError);
    expect(readFileSync(path, 'utf8')).toBe('one');
  });
});

describe('files read', () => {
  test('a folder and a missing file are problems', () => {
    for (const path of [folder, join(folder, 'none')]) {
      const read = readInputFile(path);
      expect(read.ok ? '' : read.problems[0]?.code).toBe('file-unreadable');
    }
  });
});
