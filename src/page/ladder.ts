import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import { verdictMarks } from '../report/words.ts';
import { html, type Markup } from './markup.ts';
import { gateNames, partWords, severity, toneOf } from './words.ts';

const parts: readonly Finding['part'][] = ['exchange', 'correlation', 'exchange-correlation'];

/** The conditions as the rungs of three ladders, worst on top: whole where a condition holds, broken where it is violated. */
export function ladders({ findings }: FunctionalFindings): Markup {
  const ladder = (part: Finding['part']) => {
    const rungs = findings
      .filter((finding) => finding.part === part && finding.verdict !== 'not-applicable')
      .sort((a, b) => severity(a) - severity(b));
    if (rungs.length === 0) return html``;
    return html`<section class="ladder"><h3>${partWords[part]}</h3><ol>${rungs.map(rung)}</ol></section>`;
  };
  return html`<div class="ladders">${parts.map(ladder)}</div>`;
}

function rung(finding: Finding): Markup {
  const gate = finding.verdict === 'violated' ? gateNames[finding.gate] : '';
  const words = [verdictMarks[finding.verdict].word, gate].filter((word) => word !== '').join(', ');
  return html`<li class="${toneOf(finding)}"><a href="#c-${finding.constraint}">${rungPicture(finding)}<span class="name">${finding.title}</span><span class="unseen"> – ${words}</span></a>${gate === '' ? '' : html`<span class="gate" aria-hidden="true">${gate}</span>`}</li>`;
}

/** A rung between two rails: whole, broken, or dashed where it is undecided. */
function rungPicture({ verdict }: Finding): Markup {
  const step =
    verdict === 'violated'
      ? 'M0 10H14L18 15.5M36 10H22L18 4.5'
      : verdict === 'undecided'
        ? 'M0 10h6m4 0h6m4 0h6m4 0h6'
        : 'M0 10H36';
  const double = verdict === 'proved' ? 'M0 7H36M0 13H36' : step;
  return html`<span class="rung" aria-hidden="true"><svg viewBox="0 0 36 20" width="36" height="20"><path class="step" d="${double}"/></svg></span>`;
}

/** The same on one line, for many functionals: a lying ladder with one rung for each condition, in the order of the table. */
export function lyingLadder(findings: readonly Finding[]): Markup {
  const pitch = 11;
  const width = findings.length * pitch + 6;
  const steps = findings.map((finding, index) => {
    const x = 3 + (index + 0.5) * pitch;
    const d =
      finding.verdict === 'violated'
        ? `M${x} 3V9L${x + 3} 11.5M${x} 25V19L${x - 3} 16.5`
        : finding.verdict === 'undecided'
          ? `M${x} 3v4m0 3v3m0 3v3m0 3v4`
          : finding.verdict === 'not-applicable'
            ? ''
            : `M${x} 3V25`;
    return d === '' ? '' : html`<path class="step ${toneOf(finding)}" d="${d}"/>`;
  });
  return html`<svg class="lying" viewBox="0 0 ${width} 28" preserveAspectRatio="xMinYMid meet" width="${width}" height="28" aria-hidden="true"><path class="rails" d="M0 3H${width}M0 25H${width}"/>${steps}</svg>`;
}
