import type { PartName, Rung } from '../definition/functional.ts';
import type { Problem, ProblemCode } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import { builtins } from '../expression/builtins.ts';
import { childrenOf, type Expression } from '../expression/expression.ts';
import { placedProblem } from '../expression/parse.ts';
import { type DefinitionKey, namedDefinitions } from './dependencies.ts';
import type { Functional } from './functional.ts';
import { isPartName } from './instance.ts';
import { isAbove, quantityNames, quantityOf, rungOf } from './quantities.ts';
import type { Reading, Site } from './reading.ts';

/** The faults of one expression: its names, calls and imports, against what its site may use. */
export function checkReading(
  functional: Functional,
  reading: Reading,
  defined: ReadonlySet<DefinitionKey>,
  perChannel: ReadonlySet<DefinitionKey>,
): Problem[] {
  const { site } = reading;
  const problems: Problem[] = [];
  const report = (code: ProblemCode, message: string, remedy: string, offset: number) =>
    problems.push(placedProblem(reading.source, { code, message, remedy, offset }));
  const formula = site.kind === 'step' || site.kind === 'form';
  const argumentNames = site.kind === 'function' ? site.arguments : [];
  // A step may speak of a channel freely; whoever uses the step must be inside a sum.
  visit(reading.expression, site.kind === 'step' || (site.kind === 'form' && site.insideChannel));
  return problems;

  function visit(expression: Expression, insideChannel: boolean): void {
    switch (expression.kind) {
      case 'name':
        checkName(expression.name, expression.offset, insideChannel);
        return;
      case 'member':
        checkMember(expression.object, expression.name, undefined, expression.offset);
        return;
      case 'member-call':
        checkMember(expression.object, expression.name, expression.args.length, expression.offset);
        break;
      case 'call':
        checkCall(expression.name, expression.args.length, expression.offset);
        if (expression.name === 'spinsum' && formula) {
          for (const argument of expression.args) visit(argument, true);
          return;
        }
        break;
    }
    for (const child of childrenOf(expression)) visit(child, insideChannel);
  }

  function checkName(name: string, offset: number, insideChannel: boolean): void {
    if (name === 'pi' || argumentNames.includes(name)) return;
    const quantity = quantityOf(name);
    if (quantity !== undefined) {
      if (!formula) {
        report(
          'unknown-name',
          `${name} depends on the density; ${siteText(site)} cannot use it`,
          'Pass it as an argument, or use it in a step.',
          offset,
        );
        return;
      }
      const rung = rungOf(quantity);
      if (isAbove(rung, functional.definition.rung)) {
        report(
          'above-rung',
          `${name} belongs to the rung ${rung}, above the declared ${functional.definition.rung}`,
          `Declare rung: ${rung}, or remove it.`,
          offset,
        );
      }
      const ofChannel = quantity.scope === 'channel' && (quantity.suffix === 'sigma' || quantity.suffix === 'other');
      if (ofChannel && !insideChannel) outsideChannel(name, offset);
      return;
    }
    const key = namedDefinitions({ kind: 'name', name, offset }, site, defined).keys().next().value;
    if (key === undefined) {
      report(
        'unknown-name',
        `unknown name ${name}`,
        suggestion(name, knownNames(), 'Define it under parameters or where, or check the list of quantities.'),
        offset,
      );
    } else if (perChannel.has(key) && !insideChannel) {
      outsideChannel(name, offset);
    }
  }

  function outsideChannel(name: string, offset: number): void {
    report(
      'channel-outside-sum',
      `${name} means one spin channel, but no channel is chosen here`,
      'Put it inside spinsum( … ), or name the channel: _up or _dn.',
      offset,
    );
  }

  function knownNames(): string[] {
    const own = [...defined].map((key) => key.split(' ').at(-1) as string);
    return [...own, ...argumentNames, 'pi', ...(formula ? quantityNames() : [])];
  }

  function checkCall(name: string, count: number, offset: number): void {
    if (name === 'spinsum' && formula) {
      if (count !== 1)
        report('wrong-arguments', `spinsum takes 1 argument, not ${count}`, 'Write spinsum(term).', offset);
      return;
    }
    const own = functional.definition.functions.find((fn) => fn.name === name);
    const arity = builtins.get(name)?.arity ?? own?.arguments.length;
    if (arity === undefined) {
      const known = [...builtins.keys(), ...functional.definition.functions.map((fn) => fn.name), 'spinsum'];
      report('unknown-name', `unknown function ${name}`, suggestion(name, known, 'Define it under functions.'), offset);
    } else if (arity !== count) {
      report(
        'wrong-arguments',
        `${name} takes ${plural(arity)}, not ${count}`,
        `Give ${name} ${plural(arity)}.`,
        offset,
      );
    }
  }

  function checkMember(alias: string, name: string, count: number | undefined, offset: number): void {
    const imported = functional.imports.get(alias)?.functional;
    if (imported === undefined) {
      const aliases = functional.definition.uses.map((used) => used.alias);
      if (!aliases.includes(alias)) {
        report(
          'missing-import',
          `${alias} is not imported`,
          suggestion(alias, aliases, `Add it under uses: { ${alias}: <sheet id> }.`),
          offset,
        );
      }
      return;
    }
    const { definition } = imported;
    if (isPartName(name) || name === 'enhancement') {
      checkPart(imported, name, count, offset);
    } else if (count === undefined) {
      if (imported.parameters.has(name)) return;
      report(
        'unknown-name',
        `${definition.id} has no parameter or part ${name}`,
        suggestion(name, [...imported.parameters.keys(), ...imported.parts.keys()], `See the sheet ${definition.id}.`),
        offset,
      );
    } else {
      const arity = imported.functions.get(name)?.arguments.length;
      if (arity === undefined) {
        report(
          'unknown-name',
          `${definition.id} has no function ${name}`,
          suggestion(name, imported.functions.keys(), `See the sheet ${definition.id}.`),
          offset,
        );
      } else if (arity !== count) {
        report(
          'wrong-arguments',
          `${alias}.${name} takes ${plural(arity)}, not ${count}`,
          `Give it ${plural(arity)}.`,
          offset,
        );
      }
    }
  }

  function checkPart(
    imported: Functional,
    name: PartName | 'enhancement',
    count: number | undefined,
    offset: number,
  ): void {
    const { id, rung } = imported.definition;
    const part = name === 'enhancement' ? 'exchange' : name;
    if (!formula) {
      report(
        'unknown-name',
        `an energy depends on the density; ${siteText(site)} cannot use it`,
        'Use it in a step or a form.',
        offset,
      );
    } else if (!imported.parts.has(part)) {
      report('unknown-name', `${id} has no ${part}`, `It has ${[...imported.parts.keys()].join(' and ')}.`, offset);
    } else if (count === undefined && name === 'enhancement') {
      report(
        'wrong-arguments',
        'an enhancement factor needs its arguments',
        `Write alias.enhancement(${enhancementArguments[rung]}).`,
        offset,
      );
    } else if (count === undefined) {
      if (isAbove(rung, functional.definition.rung)) {
        report(
          'above-rung',
          `${id} is of the rung ${rung}, above the declared ${functional.definition.rung}`,
          `Declare rung: ${rung}.`,
          offset,
        );
      }
    } else {
      const wanted = (name === 'enhancement' ? enhancementArguments : sliceArguments)[rung];
      const least = wanted === '' ? 0 : wanted.split(', ').length;
      if (count < least || count > least + (rung === 'meta-gga' ? 1 : 0)) {
        report(
          'wrong-arguments',
          `${id} is of the rung ${rung}: its ${name} takes (${wanted})`,
          'Give it these coordinates.',
          offset,
        );
      }
    }
  }
}

const sliceArguments: Record<Rung, string> = {
  lda: 'rs, zeta',
  gga: 'rs, zeta, s',
  'meta-gga': 'rs, zeta, s, alpha',
};

const enhancementArguments: Record<Rung, string> = { lda: '', gga: 's', 'meta-gga': 's, alpha' };

function siteText(site: Site): string {
  switch (site.kind) {
    case 'parameter':
    case 'import':
      return 'a parameter';
    case 'function':
      return 'a named function';
    case 'exact-exchange':
      return 'a share of exact exchange';
    default:
      return 'a step';
  }
}

function plural(count: number): string {
  return count === 1 ? '1 argument' : `${count} arguments`;
}
