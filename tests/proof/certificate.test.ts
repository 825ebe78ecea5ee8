import { describe, expect, it } from 'vitest';
import type { Condition } from '../../src/constraint/condition.ts';
import { customDomain, type DomainCoordinate } from '../../src/constraint/domain.ts';
import type { Certificate } from '../../src/finding/certificate.ts';
import { certificateOf, digestOf } from '../../src/proof/certificate.ts';
import { proveCondition } from '../../src/proof/prove.ts';
import { verifyCertificate } from '../../src/proof/verify.ts';
import { conditionOf, functionalOf, standardSettings } from '../constraint/catalogue.ts';

const condition = conditionOf('correlation-non-positive') as Condition;
const pw92 = functionalOf('pw92');

function certificateFor(
  id: string,
  bounds: ConstructorParameters<typeof Map<DomainCoordinate, [number, number]>>[0] = [],
): Certificate {
  const functional = functionalOf(id);
  const settings = { ...standardSettings, domain: customDomain(new Map(bounds)) };
  const { claim, result } = proveCondition(condition, functional, settings, { budget: 5_000, keepTree: true });
  if (claim === undefined || result === undefined) throw new Error('not provable');
  return certificateOf(condition, functional, settings, claim, result, '0.0.0');
}

/** With a digest that fits again: a forger's certificate. */
const forged = (certificate: Certificate): Certificate => ({ ...certificate, digest: digestOf(certificate) });

describe('certificates', () => {
  const certificate = certificateFor('pw92');

  it('a proof is verified by decimal arithmetic on every box', () => {
    expect(verifyCertificate(certificate, condition, pw92)).toEqual({ ok: true, leaves: (certificate.boxes + 1) / 2 });
  });

  it('PBE with its logarithms merged is verified, rewrites and all', () => {
    const ofPbe = certificateFor('pbe', [
      ['rs', [2, 5]],
      ['s', [0, 2]],
    ]);
    expect(ofPbe.rewrites).toContain('merge-logarithms');
    expect(verifyCertificate(ofPbe, condition, functionalOf('pbe'))).toMatchObject({ ok: true });
  });

  it('boxes that touch the switch at α = 1, a pole and infinity are verified', () => {
    const bound = conditionOf('exchange-lieb-oxford') as Condition;
    const functional = functionalOf('scan');
    const infinity = Number.POSITIVE_INFINITY;
    const axes = new Map<DomainCoordinate, [number, number]>([
      ['s', [0, infinity]],
      ['alpha', [0, infinity]],
    ]);
    const settings = { ...standardSettings, domain: customDomain(axes) };
    const { claim, result } = proveCondition(bound, functional, settings, { budget: 500, keepTree: true });
    if (claim === undefined || result === undefined) throw new Error('not provable');
    const made = certificateOf(bound, functional, settings, claim, result, '0.0.0');
    expect(verifyCertificate(JSON.parse(JSON.stringify(made)), bound, functional)).toMatchObject({ ok: true });
  });

  it.each(['tpss', 'tm'])(
    'F_c ≥ 0 of %s is verified, the corner s = α = 0 where τ_W/τ is 0/0 among its boxes',
    (id) => {
      expect(verifyCertificate(certificateFor(id), condition, functionalOf(id))).toMatchObject({ ok: true });
    },
  );

  it('one changed character anywhere is refused', () => {
    for (const changed of [
      { ...certificate, deepest: certificate.deepest + 1 },
      { ...certificate, tolerance: 2e-9 },
      { ...certificate, tree: certificate.tree.replace('1', '0') },
    ]) {
      expect(verifyCertificate(changed, condition, pw92)).toMatchObject({ ok: false });
    }
  });

  it('a missing box is refused, even with a digest that fits', () => {
    const tree = certificate.tree.slice(0, -1);
    expect(verifyCertificate(forged({ ...certificate, tree }), condition, pw92)).toMatchObject({ ok: false });
    const fewer = forged({ ...certificate, tree, boxes: tree.length });
    expect(verifyCertificate(fewer, condition, pw92)).toMatchObject({
      ok: false,
      reason: /neither proved nor divided/ as unknown,
    });
  });

  it('a whole domain claimed to be one box is refused where it needs thousands: the decimal forms do not prove it', () => {
    const scaling = conditionOf('correlation-coordinate-scaling') as Condition;
    const functional = functionalOf('pbe');
    const { claim, result } = proveCondition(scaling, functional, standardSettings, { budget: 10, keepTree: true });
    if (claim === undefined || result === undefined) throw new Error('not provable');
    const made = certificateOf(scaling, functional, standardSettings, claim, result, '0.0.0');
    const claimed = forged({ ...made, tree: '.', boxes: 1, deepest: 0 });
    expect(verifyCertificate(claimed, scaling, functional)).toMatchObject({
      ok: false,
      reason: /box 1 cannot be verified: rs 0.01…100, w 0…1, s 0…5/ as unknown,
    });
  });

  it('a false claim on boxes that cover the domain is refused: F_c of PW92 is not 0.01 everywhere', () => {
    const claimed = forged({ ...certificate, tolerance: -0.01 });
    expect(verifyCertificate(claimed, condition, pw92)).toMatchObject({ ok: false });
  });

  it('another sheet, another condition, another domain are refused', () => {
    expect(verifyCertificate(certificate, condition, functionalOf('vwn5'))).toMatchObject({ ok: false });
    const other = conditionOf('correlation-kinetic-ceiling') as Condition;
    expect(verifyCertificate(certificate, other, pw92)).toMatchObject({ ok: false });
    const [first, ...rest] = certificate.domain;
    const wider = forged({ ...certificate, domain: [{ ...(first as (typeof rest)[number]), upper: 1000 }, ...rest] });
    expect(verifyCertificate(wider, condition, pw92)).toMatchObject({ ok: false });
  });
});
