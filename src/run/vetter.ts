import { closedFormsByAlgebra } from '../closed-form/algebra.ts';
import type { Condition } from '../constraint/condition.ts';
import { type Constraint, readConstraint } from '../constraint/constraint.ts';
import { type Progress, vetFunctional } from '../constraint/vet.ts';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import type { Finding, FunctionalFindings, SheetPlaces } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import { claimFields } from '../proof/certificate.ts';
import { claimJudge } from '../proof/decide-claim.ts';
import { provableClaim, withProof } from '../proof/prove.ts';
import { claimIdentity } from '../proof/search-state.ts';
import type { JudgeBlock } from '../search/box-search.ts';
import type { ShelfFolders } from '../shelf/sheet-files.ts';
import { openShelf } from '../shelf/shelf.ts';
import { type RunSettings, settingsOf } from './settings.ts';
import { sheetHash } from './sources.ts';

/** One condition asked of one functional: the unit of work, and of the cache. */
export interface Unit {
  readonly sheet: string;
  readonly constraint: string;
}

/** The finding of a unit, with what is known of the functional, and the hash of the sheets it was found for. */
export interface UnitFinding {
  readonly functional: Omit<FunctionalFindings, 'findings' | 'places'>;
  readonly places: Omit<SheetPlaces, 'file' | 'catalogue'>;
  readonly finding: Finding;
  readonly sheetHash: string;
}

/** Vets units one by one; each in a graph of its own, so that a finding does not depend on what else is vetted. */
export class Vetter {
  readonly #shelf;
  readonly #settings: RunSettings;
  readonly #conditions = new Map<string, Outcome<Constraint>>();
  #sheet: { readonly name: string; readonly functional: Outcome<Functional> } | undefined;

  constructor(folders: ShelfFolders, settings: RunSettings) {
    this.#shelf = openShelf(folders);
    this.#settings = settings;
  }

  vet({ sheet, constraint }: Unit, onProgress: Progress): Outcome<UnitFinding> {
    const functional = this.#functional(sheet);
    const condition = this.condition(constraint);
    if (!functional.ok) return functional;
    if (!condition.ok) return condition;
    const settings = { ...settingsOf(this.#settings), closedForms: closedFormsByAlgebra };
    const found = vetFunctional(functional.value, [condition.value], settings, onProgress);
    const { findings, places: _places, ...header } = found;
    return success({
      functional: { ...header, parameters: this.#settings.parameters },
      places: placesOf(functional.value),
      finding: this.#withProof(findings[0] as Finding, condition.value, functional.value, onProgress),
      sheetHash: linkedHash(functional.value),
    });
  }

  /** The judge of the boxes of a unit's claim; a problem when the claim is not that of the identity any more. */
  claimJudge({ sheet, constraint }: Unit, identity: string): Outcome<JudgeBlock> {
    const functional = this.#functional(sheet);
    const condition = this.condition(constraint);
    if (!functional.ok) return functional;
    if (!condition.ok) return condition;
    const judge =
      condition.value.kind === 'rule' ? undefined : this.#judgeOf(condition.value, functional.value, identity);
    if (judge !== undefined) return success(judge);
    const message = `${sheet}, ${constraint} or a sheet that they use was changed during the proof`;
    return failure([{ code: 'changed-meanwhile', message, remedy: 'Run it again.' }]);
  }

  #judgeOf(condition: Condition, functional: Functional, identity: string): JudgeBlock | undefined {
    const settings = settingsOf(this.#settings);
    const claim = provableClaim(condition, functional, settings);
    if (typeof claim === 'string') return undefined;
    const isSame = claimIdentity(claimFields(condition, functional, settings, claim), claim) === identity;
    return isSame ? claimJudge(claim) : undefined;
  }

  #withProof(finding: Finding, constraint: Constraint, functional: Functional, onProgress: Progress): Finding {
    const { proofBoxes } = this.#settings;
    if (proofBoxes === undefined || constraint.kind === 'rule') return finding;
    const options = { budget: proofBoxes, onBoxes: (boxes: number) => onProgress(functional.definition.id, boxes) };
    return withProof(finding, constraint, functional, settingsOf(this.#settings), options);
  }

  /** A condition with the tolerance of the settings. */
  condition(id: string): Outcome<Constraint> {
    const known = this.#conditions.get(id) ?? this.#readCondition(id);
    this.#conditions.set(id, known);
    return known;
  }

  #readCondition(id: string): Outcome<Constraint> {
    const definition = this.#shelf.constraint(id);
    if (!definition.ok) return definition;
    const tolerance = this.#settings.tolerances[id] ?? definition.value.tolerance;
    return readConstraint({ ...definition.value, tolerance }, (sheet) => this.#shelf.functional(sheet));
  }

  /** Units come sheet by sheet, so only the last is kept. */
  #functional(name: string): Outcome<Functional> {
    if (this.#sheet?.name !== name) {
      const found = this.#shelf.functional(name);
      const problems = found.ok ? unknownParameters(found.value, Object.keys(this.#settings.parameters)) : [];
      this.#sheet = { name, functional: problems.length > 0 ? failure(problems) : found };
    }
    return this.#sheet.functional;
  }
}

/** The names that are no parameters of a functional, as problems of --set. */
export function unknownParameters({ definition, parameters }: Functional, names: readonly string[]): Problem[] {
  return names.flatMap((name): Problem[] => {
    if (parameters.has(name)) return [];
    const known = [...parameters.keys()];
    const otherwise = known.length === 0 ? 'It has none.' : `It has ${known.join(', ')}.`;
    const remedy = suggestion(name, known, otherwise);
    return [{ code: 'wrong-option', message: `--set: ${definition.id} has no parameter ${name}`, remedy }];
  });
}

/** The same hash as that of the files, from what was read and joined. */
function linkedHash({ definition, imports }: Functional): string {
  const used = definition.uses.map(({ alias }) => linkedHash(imports.get(alias)?.functional as Functional));
  return sheetHash(definition.id, definition.text, used);
}

/** The first term of each part, and the parameters. */
function placesOf({ definition }: Functional): UnitFinding['places'] {
  const lineOf = ({ line, column }: { readonly line: number; readonly column: number }) => ({ line, column });
  return {
    parts: Object.fromEntries(
      definition.parts.map(({ name, form, place }) => {
        const term = 'value' in form ? form.value.placeAt(0) : 'sameSpin' in form ? form.sameSpin.placeAt(0) : place;
        return [name, lineOf(term)];
      }),
    ),
    parameters: Object.fromEntries(definition.parameters.map(({ name, place }) => [name, lineOf(place)])),
  };
}
