import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import { countFindings } from '../finding/gate-counts.ts';
import { knownCoordinates, placeWords } from '../report/words.ts';
import { ladders, lyingLadder } from './ladder.ts';
import { html, joined, type Markup } from './markup.ts';
import { notation } from './notation.ts';
import type { ReportInput } from './report-input.ts';
import { gateNames, listed, marginShort, plural, severity } from './words.ts';

/** Broken conditions that the summary tells of. */
const mostListed = 6;

/** What a person is to grasp in ten seconds. */
export function summarySection(input: ReportInput): Markup {
  const { functionals } = input.findings;
  const [only] = functionals;
  const inner = functionals.length === 1 && only !== undefined ? oneSummary(only) : manySummary(functionals);
  return html`<section id="summary" aria-labelledby="summary-title"><h2 id="summary-title" class="unseen">Summary</h2>${inner}</section>`;
}

function oneSummary(functional: FunctionalFindings): Markup {
  const violated = worst(functional.findings, 'violated');
  const undecided = worst(functional.findings, 'undecided');
  const known = knownCoordinates(functional);
  const line = (finding: Finding) => {
    const gate = finding.verdict === 'violated' ? gateNames[finding.gate] : 'undecided';
    return html`<li><a href="#c-${finding.constraint}">${finding.title}</a> <span class="gate gate-${finding.gate}">${gate}</span><br><span class="by">${by(finding, known)}</span></li>`;
  };
  const all = [...violated, ...undecided];
  // The ladders below have all of them; here stand those that weigh most.
  const weighty = all.filter(({ gate }) => gate === 'fail' || gate === 'warn');
  const list = (weighty.length === 0 ? all : weighty).slice(0, mostListed);
  return html`<p class="answer">${answer(functional)}</p>
<p class="note">${countWords(functional)}</p>
${list.length === 0 ? '' : html`<ol class="broken">${list.map(line)}</ol>`}
${ladders(functional)}
<p class="note">A whole rung: no violation was found on the domain, which is not a proof. A broken rung: the worst point was confirmed in high precision.${provedWords(functional)}${skipped(functional)}</p>`;
}

/** What a double rung is, and how far the proofs that were tried for the others came. */
function provedWords({ findings }: FunctionalFindings): string {
  const tried = findings.filter(({ proof }) => proof !== undefined && proof.stop !== 'not-provable');
  if (tried.length === 0) return '';
  const count = (of: (finding: Finding) => boolean) => tried.filter(of).length;
  const certified = count(({ verdict, proof }) => verdict === 'violated' && proof?.certifiedAtWitness === true);
  const open = count(({ verdict }) => verdict === 'holds' || verdict === 'undecided');
  return ` A double rung: proved on the whole domain by interval arithmetic, to the tolerance stated. Of ${plural(tried.length, 'condition')} that boxes can decide, ${listed([`${count(({ verdict }) => verdict === 'proved')} are proved`, `${certified} have a certified violation`, `${open} are left undecided in part`])}.`;
}

/** By how much and where; of what has no margin, only where. */
function by(finding: Finding, known: readonly string[]): Markup {
  const place = placeWords(finding, known);
  const where = place === '' || place === 'everywhere alike' ? html`${place}` : html`at ${notation(place)}`;
  return finding.margin === null ? where : html`margin ${marginShort(finding)} ${where}`;
}

function answer({ name, findings }: FunctionalFindings): Markup {
  const { verdicts, gates } = countFindings(findings);
  const asked = findings.length - verdicts['not-applicable'];
  if (verdicts.violated === 0 && verdicts.undecided === 0) {
    return html`<b>${name}</b> breaks <em class="none">none</em> of the ${asked} exact conditions asked of it.`;
  }
  const failing =
    gates.fail === 0 ? html` None counts as a failure.` : html` ${failureWords(gates.fail, verdicts.violated)}`;
  return html`<b>${name}</b> breaks <em>${verdicts.violated} of ${asked}</em> exact conditions asked of it.${verdicts.violated === 0 ? '' : failing}`;
}

function failureWords(fails: number, violated: number): string {
  if (fails === violated) return violated === 1 ? 'It counts as a failure.' : 'All count as failures.';
  return fails === 1 ? 'One counts as a failure.' : `${fails} count as failures.`;
}

function countWords({ findings }: FunctionalFindings): string {
  const { verdicts, gates } = countFindings(findings);
  const violated = (['fail', 'warn', 'note', 'score', 'accepted'] as const)
    .filter((gate) => gates[gate] > 0)
    .map((gate) =>
      plural(
        findings.filter((finding) => finding.gate === gate && finding.verdict === 'violated').length,
        gateNames[gate],
        gate === 'accepted' ? 'accepted' : undefined,
      ),
    )
    .filter((text) => !text.startsWith('0 '));
  const rest = [
    ...(verdicts.undecided > 0 ? [`${verdicts.undecided} undecided`] : []),
    `${verdicts.holds} without a violation`,
    ...(verdicts.proved > 0 ? [`${verdicts.proved} proved`] : []),
  ];
  return `${violated.length === 0 ? '' : `Violated: ${listed(violated)}. `}${listed(rest)[0]?.toUpperCase()}${listed(rest).slice(1)}.`;
}

function skipped({ findings }: FunctionalFindings): string {
  const count = findings.filter(({ verdict }) => verdict === 'not-applicable').length;
  return count === 0 ? '' : ` ${plural(count, 'condition does', 'conditions do')} not apply.`;
}

function worst(findings: readonly Finding[], verdict: Finding['verdict']): Finding[] {
  return findings.filter((finding) => finding.verdict === verdict).sort((a, b) => severity(a) - severity(b));
}

function manySummary(functionals: readonly FunctionalFindings[]): Markup {
  const differing = differingConditions(functionals);
  const conditions = functionals[0]?.findings.length ?? 0;
  const counts = functionals.map(({ findings }) => countFindings(findings).verdicts.violated);
  const [least, most] = [Math.min(...counts), Math.max(...counts)];
  const named = (count: number) =>
    listed(functionals.filter((_, index) => counts[index] === count).map(({ name }) => name));
  const row = (functional: FunctionalFindings) => {
    const { verdicts, gates } = countFindings(functional.findings);
    return html`<tr><th scope="row"><a href="#f-${functional.id}">${functional.name}</a></th><td class="number ${verdicts.violated > 0 ? 'violated' : ''}">${verdicts.violated}</td><td class="number ${gates.fail > 0 ? 'violated gate-fail' : ''}">${gates.fail}</td><td class="number">${verdicts.holds + verdicts.proved}</td><td class="number">${verdicts.undecided}</td><td class="strip">${lyingLadder(functional.findings)}</td></tr>`;
  };
  const spread =
    least === most
      ? html`Each breaks <em>${least}</em>.`
      : html`<b>${named(least)}</b> ${counts.filter((count) => count === least).length === 1 ? 'breaks' : 'break'} least, <em>${least}</em>; <b>${named(most)}</b> most, <em>${most}</em>.`;
  return html`<p class="answer">${functionals.length} functionals, ${conditions} conditions. ${spread}</p>
<p class="note">${differing.size === 0 ? 'The verdicts are alike on every condition.' : `The verdicts differ on ${plural(differing.size, 'condition')}; the table below has them in front.`}</p>
<div class="scroller" tabindex="0" role="region" aria-label="Counts by functional"><table class="overview"><caption class="unseen">Counts by functional</caption><thead><tr><th scope="col">functional</th><th scope="col" class="number">violated</th><th scope="col" class="number">failures</th><th scope="col" class="number">hold</th><th scope="col" class="number">undecided</th><th scope="col">conditions in the order of the catalogue; a broken rung is a violated one</th></tr></thead><tbody>${joined(functionals.map(row))}</tbody></table></div>`;
}

/** Conditions on which functionals that they apply to have different verdicts. */
export function differingConditions(functionals: readonly FunctionalFindings[]): Set<string> {
  const conditions = functionals[0]?.findings.map(({ constraint }) => constraint) ?? [];
  const kind = (finding: Finding | undefined) => (finding?.verdict === 'proved' ? 'holds' : finding?.verdict);
  return new Set(
    conditions.filter((_, index) => {
      const verdicts = functionals
        .map(({ findings }) => kind(findings[index]))
        .filter((verdict) => verdict !== 'not-applicable');
      return new Set(verdicts).size > 1;
    }),
  );
}
