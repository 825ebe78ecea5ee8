import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { failure, type Outcome, ProblemError, success } from '../errors/problem.ts';
import { type Certificate, certificateSchema } from '../finding/certificate.ts';
import { type OpenVerification, openVerification, verificationOf } from '../proof/verify.ts';
import { countText } from '../report/number-text.ts';
import { builtFolder } from '../run/program-files.ts';
import { recheckBoxes } from '../run/recheck-threads.ts';
import { findFunctional, loadConditions, openCatalogue } from './engine.ts';
import { readInputFile } from './input-file.ts';
import { settle } from './problems.ts';
import { progressLine } from './progress.ts';
import { parseJson } from './state-file.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';
import { parseJobs } from './vet-request.ts';

export interface VerifyOptions {
  readonly constraints?: readonly string[];
  readonly sheet?: string;
  readonly jobs?: string;
}

/** `rungcheck verify`: status 0 when every box of the certificate is verified, 1 when it is refused. */
export async function verifyCommand(file: string, options: VerifyOptions, terminal: Terminal): Promise<number> {
  const jobs = settle(parseJobs(options.jobs));
  const certificate = settle(readCertificate(file));
  const shelf = openCatalogue(options.constraints ?? []);
  const functional = settle(findFunctional(shelf, options.sheet ?? certificate.functional));
  const [condition] = settle(loadConditions(shelf, [certificate.constraint]));
  if (condition === undefined) throw new ProblemError([]);
  const open = openVerification(certificate, condition, functional);
  const result = open.ok ? verificationOf(open, await evaluated(open, file, jobs, terminal)) : open;
  if (!result.ok) {
    terminal.writeOut(`refused: ${result.reason}\n`);
    return exitStatus.fails;
  }
  const { functional: id, constraint, tolerance } = certificate;
  const boxes = `${countText(result.leaves)} ${result.leaves === 1 ? 'box' : 'boxes'}`;
  terminal.writeOut(`verified: ${id} holds ${constraint} to ${tolerance} on all of ${boxes}, by decimal arithmetic\n`);
  return exitStatus.fine;
}

/** The index of the first box that does not hold. Every thread but this one needs the built program. */
async function evaluated(open: OpenVerification, file: string, jobs: number, terminal: Terminal): Promise<number> {
  const built = builtFolder();
  const script = built === undefined ? undefined : pathToFileURL(join(built, 'worker.js'));
  const progress = progressLine(terminal, Date.now, 'boxes');
  try {
    const onBoxes = (boxes: number) => progress.report(file, boxes);
    return await recheckBoxes(open.work, open.leaves.boxes, { script, jobs, onBoxes });
  } finally {
    progress.end();
  }
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
