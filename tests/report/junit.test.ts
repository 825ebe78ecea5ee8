import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { junitXml } from '../../src/report/junit.ts';
import { element, xmlText } from '../../src/report/xml.ts';
import { compared, report } from './machine.ts';
import { parseXml, type Read } from './read-xml.ts';

const cases = (text: string) => {
  const suites = parseXml(text).children;
  return suites.flatMap((suite) => suite.children.filter(({ name }) => name === 'testcase'));
};
const told = (one: Read) => {
  const outcome = one.children.map(({ name }) => name).join(' ') || 'passes';
  return `${one.attributes.classname} ${one.attributes.name}: ${outcome}`;
};

describe('JUnit XML', () => {
  test('has a case for each condition, with what becomes of it', () => {
    expect(cases(junitXml(report)).map(told)).toEqual([
      'invented-meta invented-bound: passes',
      'invented-meta invented-other: skipped',
      'invented-meta invented-scaling: system-out',
      'invented-meta invented-doubt: skipped',
      'invented-meta invented-spot: failure',
      'invented-meta invented-digits: failure',
      'invented-meta invented-known: skipped',
      'invented-meta invented-bound: skipped',
      './broken.yaml sheet: error',
    ]);
  });

  test('against a record only what is worse fails, what is gone included', () => {
    const failures = cases(junitXml(compared)).filter((one) => one.children.some(({ name }) => name === 'failure'));
    expect(failures.map(told)).toEqual([
      'invented-meta invented-spot: failure',
      'invented-meta invented-digits: failure',
      'gone functional: failure',
    ]);
  });

  test('the counts of a suite are those of its cases', () => {
    for (const suite of parseXml(junitXml(report)).children) {
      const own = suite.children.filter(({ name }) => name === 'testcase');
      const count = (name: string) =>
        own.filter(({ children }) => children.some((child) => child.name === name)).length;
      expect(suite.attributes).toMatchObject({
        tests: String(own.length),
        failures: String(count('failure')),
        errors: String(count('error')),
        skipped: String(count('skipped')),
      });
    }
  });

  test('points at file and line', () => {
    const scaling = cases(junitXml(report)).find(({ attributes }) => attributes.name === 'invented-scaling');
    expect(scaling?.attributes).toMatchObject({ file: 'sheets/invented meta.yaml', line: '15' });
  });

  test('any text is well-formed XML and reads back, but for characters that XML forbids (seed 5)', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 40 }), (text) => {
        // biome-ignore lint/suspicious/noControlCharactersInRegex: XML 1.0, section 2.2
        const allowed = text.replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]|\p{Surrogate}/gu, '\ufffd');
        const read = parseXml(xmlText(element('a', { b: text }, [element('c', {}, [text])])));
        return read.attributes.b === allowed && (read.children[0]?.text ?? '') === allowed;
      }),
      { seed: 5, numRuns: 500 },
    );
  });
});
