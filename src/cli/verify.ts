import { failure, type Outcome, ProblemError, success } from '../errors/problem.ts';
import { type Certificate, certificateSchema } from '../finding/certificate.ts';
import { verifyCertificate } from '../proof/verify.ts';
import { findFunctional, loadConditions, openCatalogue } from './engine.ts';
import { readInputFile } from './input-file.ts';
import { settle } from './problems.ts';
import { progressLine } from './progress.ts';
import { parseJson } from './state-file.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

export interface VerifyOptions {
  readonly constraints?: readonly string[];
  readonly sheet?: string;
}

/** `rungcheck verify`: status 0 when every box of the certificate is verified, 1 when it is refused. */
export function verifyCommand(file: string, options: VerifyOptions, terminal: Terminal): number {
  const certificate = settle(readCertificate(file));
  const shelf = openCatalogue(options.constraints ?? []);
  const functional = settle(findFunctional(shelf, options.sheet ?? certificate.functional));
  const [condition] = settle(loadConditions(shelf, [certificate.constraint]));
  if (condition === undefined) throw new ProblemError([]);
  const progress = progressLine(terminal, Date.now, 'boxes');
  const result = verifyCertificate(certificate, condition, functional, (boxes) => progress.report(file, boxes));
  progress.end();
  if (!result.ok) {
    terminal.writeOut(`refused: ${result.reason}\n`);
    return exitStatus.fails;
  }
  const { functional: id, constraint, tolerance } = certificate;
  const boxes = `${result.leaves.toLocaleString('en')} ${result.leaves === 1 ? 'box' : 'boxes'}`;
  terminal.writeOut(`verified: ${id} holds ${constraint} to ${tolerance} on all of ${boxes}, by decimal arithmetic\n`);
  return exitStatus.fine;
}

function readCertificate(file: string): Outcome<Certificate> {
  const text = readInputFile(file);
  if (!text.ok) return text;
  const read = certificateSchema.safeParse(parseJson(text.value));
  if (read.success) return success(read.data);
  const [issue] = read.error.issues;
  const at = issue?.path.join('.') || 'its root';
  const message = `the file is no certificate of rungcheck: ${issue?.message} at ${at}`;
  const remedy = 'Write one with rungcheck prove <functional> <condition> --certificate <file>.';
  return failure([{ code: 'wrong-findings', file, message, remedy }]);
}
