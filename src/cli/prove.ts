import { type Domain, domainCoordinates } from '../constraint/domain.ts';
import type { ProofRecord } from '../finding/finding.ts';
import { certificateOf, claimFields } from '../proof/certificate.ts';
import { provableClaim, recordOf, recordOfNone } from '../proof/prove.ts';
import { jsonText } from '../report/json.ts';
import { isProved, proofText } from '../report/proof-text.ts';
import { domainWords } from '../report/words.ts';
import { settingsOf } from '../run/settings.ts';
import { writeOutputFile } from './output-file.ts';
import { packageVersion } from './package-root.ts';
import { type ProveOptions, type ProveRequest, readProveRequest } from './prove-request.ts';
import { searchProof } from './prove-search.ts';
import { writeSearchState } from './search-state-file.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

/**
 * `rungcheck prove`: status 0 when the condition is proved, 1 when it is violated or not decided, and that of the signal
 * when one has ended the search before.
 */
export async function proveCommand(
  sheet: string,
  constraint: string,
  options: ProveOptions,
  terminal: Terminal,
): Promise<number> {
  const request = readProveRequest(sheet, constraint, options);
  const { functional, condition } = request;
  const settings = settingsOf(request.settings);
  const claim = provableClaim(condition, functional, settings);
  const { certificate, state } = options;
  const tell = (variables: readonly string[], record: ProofRecord) =>
    terminal.writeOut(reportText(request, variables, record, options.format, terminal.width));
  const withoutCertificate = () => {
    if (certificate !== undefined) terminal.writeErr('no certificate is written: nothing is proved\n');
  };
  if (typeof claim === 'string') {
    tell([], recordOfNone(claim));
    withoutCertificate();
    return exitStatus.fails;
  }
  const fields = claimFields(condition, functional, settings, claim);
  const keepTree = certificate !== undefined || state !== undefined;
  const { result, judged, signalStatus } = await searchProof(request, claim, fields, { state, keepTree }, terminal);
  const record = recordOf(claim, result);
  tell(claim.variables, record);
  if (state !== undefined) {
    writeSearchState(state, fields, claim, judged);
    const more = { budget: 'more --boxes go', interrupted: 'the same command goes' }[record.stop as string];
    if (more !== undefined) terminal.writeErr(`${state} keeps the search: ${more} on from there\n`);
  }
  if (!isProved(record)) {
    withoutCertificate();
    return record.stop === 'interrupted' && signalStatus !== undefined ? signalStatus : exitStatus.fails;
  }
  if (certificate !== undefined) {
    const text = JSON.stringify(certificateOf(condition, functional, settings, claim, result, packageVersion()));
    writeOutputFile(certificate, `${text}\n`);
  }
  return exitStatus.fine;
}

function reportText(
  { functional, condition, settings }: ProveRequest,
  variables: readonly string[],
  proof: ProofRecord,
  format: ProveOptions['format'],
  width: number,
): string {
  const { id, requirement, tolerance } = condition.definition;
  const report = {
    functional: functional.definition.id,
    constraint: id,
    requirement: requirement.text,
    tolerance,
    domain: wordsOf(settings.domain, variables),
    proof,
  };
  return format === 'json' ? jsonText(report) : proofText(report, width);
}

function wordsOf({ axes }: Domain, variables: readonly string[]): string {
  const named = domainCoordinates.filter(
    (name) => variables.includes(name) || (name === 'zeta' && variables.includes('w')),
  );
  const coordinates = named.map((name) => {
    const { lower, upper, scale } = axes[name];
    return { name, lower, upper: Number.isFinite(upper) ? upper : null, points: 0, scale };
  });
  if (coordinates.length === 0) return 'it depends on no coordinate';
  return domainWords({ name: 'custom', space: 'slice', coordinates, fixed: {} });
}
