import { describe, expect, test } from 'vitest';
import { escapeLatex, vetLatex } from '../../src/report/vet-latex.ts';
import { escapeMarkdown, vetMarkdown } from '../../src/report/vet-markdown.ts';
import { findingsOf, functional, violated } from './made-up.ts';

const findings = findingsOf(functional);

describe('Markdown', () => {
  const text = vetMarkdown(findings);

  test('has a row for each finding that applies, worst first, with margin and place (made-up.ts)', () => {
    const rows = text.split('\n').filter((line) => line.startsWith('| Invented'));
    expect(rows.map((row) => row.split('|').length)).toEqual([6, 6, 6, 6]);
    expect(rows[0]).toContain('| ✗ violated (fails) | −0.00231 | r<sub>s</sub> = 0.5123, ζ = 1, s = 2.123, every α |');
  });

  test('every mark of a row has its note', () => {
    const marks = [...text.matchAll(/\| Invented[^|]*<sup>([a-z, ]+)<\/sup>/g)].flatMap(
      ([, list]) => list?.split(', ') ?? [],
    );
    const notes = [...text.matchAll(/^<sup>([a-z]+)<\/sup> /gm)].map(([, letter]) => letter);
    expect(new Set(marks)).toEqual(new Set(notes));
  });

  test('two functionals begin with a matrix of a column each', () => {
    const both = vetMarkdown(findingsOf(functional, { ...functional, id: 'other', name: 'Other' }));
    expect(both).toMatch(
      /^\| Condition \| INV-1 \| Other \|\n\| --- \| --- \| --- \|\n\| invented-bound \| ○ holds \| ○ holds \|/,
    );
  });

  test('markup in a title stays text', () => {
    const title = '<img onerror=x> | *bold* [a](b) `c` $d$ _e_';
    const hostile = vetMarkdown(findingsOf({ ...functional, findings: [{ ...violated, title }] }));
    expect(hostile).toContain(String.raw`| &lt;img onerror=x&gt; \| \*bold\* \[a\](b) \`c\` \$d\$ \_e\_<sup>a</sup> |`);
    expect(escapeMarkdown('a\nb & c\\d')).toBe(String.raw`a b &amp; c\\d`);
  });
});

describe('LaTeX', () => {
  const text = vetLatex(findings);

  test('is a longtable of four columns with rules of booktabs', () => {
    expect(text).toMatch(/\\toprule[\s\S]*\\midrule[\s\S]*\\bottomrule/);
    const rows = text.split('\n').filter((line) => line.startsWith('Invented') && line.endsWith('\\\\'));
    expect(rows).toHaveLength(4);
    for (const row of rows) expect(row.match(/(?<!\\)&/g)).toHaveLength(3);
    expect(rows[0]).toContain('$r_s = 0.5123$, $\\zeta = 1$, $s = 2.123$, every~$\\alpha$');
  });

  test('every environment and group that is begun is ended', () => {
    const count = (pattern: RegExp) => text.match(pattern)?.length ?? 0;
    expect(count(/\\begin\{/g)).toBe(count(/\\end\{/g));
    expect(count(/\\begingroup/g)).toBe(count(/\\endgroup/g));
    expect(count(/(?<!\\)\{/g)).toBe(count(/(?<!\\)\}/g));
  });

  test('what LaTeX reserves is escaped, symbols become math', () => {
    expect(escapeLatex('50 % of $x & y_1 # {z} \\input ~^')).toBe(
      '50 \\% of \\$x \\& y\\_1 \\# \\{z\\} \\textbackslash{}input \\textasciitilde{}\\textasciicircum{}',
    );
    expect(escapeLatex('∂F/∂r ≥ 0, ζ → 1')).toBe('$\\partial$F/$\\partial$r $\\ge$ 0, $\\zeta$ $\\to$ 1');
  });
});
