/** What can be read off a functional at a few points. */
export type ConstantName =
  | 'gas-exchange'
  | 'exchange-gradient'
  | 'exchange-large-s'
  | 'correlation-gradient'
  | 'pbe-gamma'
  | 'gas-high-density'
  | 'gas-correlation';

/** A published value of a constant, or of the three numbers that tell a parametrisation of the gas. */
export interface PublishedConstant {
  readonly values: readonly number[];
  readonly name: string;
}

const pbeBeta = 0.06672455060314922;
const gamma = (1 - Math.log(2)) / Math.PI ** 2;

/**
 * The variants that are in use. Correlation of the gas is ε_c(r_s = 2) at ζ = 0, 0.5 and 1 in hartree, computed in 20
 * digits from the constants of each publication, as the sheets named alike have them.
 */
export const publishedConstants: Readonly<Record<ConstantName, readonly PublishedConstant[]>> = {
  'gas-exchange': [{ values: [1], name: 'Dirac' }],
  'exchange-gradient': [
    { values: [0], name: 'none' },
    { values: [10 / 81], name: '10/81 (Antoniewicz, Kleinman 1985)' },
    { values: [7 / 81], name: '7/81 (Sham 1971)' },
    { values: [0.1235], name: '10/81 printed as 0.1235' },
    { values: [(pbeBeta * Math.PI ** 2) / 3], name: 'PBE, βπ²/3 with all digits of β' },
    { values: [0.21951], name: 'PBE as printed, 0.21951' },
    { values: [(0.066725 * Math.PI ** 2) / 3], name: 'βπ²/3 with the printed β = 0.066725' },
    { values: [0.26], name: 'APBE (2011), 0.260' },
    { values: [0.27583], name: 'PBEmol (2012), 0.27583' },
    { values: [1.296 / 15], name: 'PW86 (1986), 1.296/15' },
    { values: [1.851 / 15], name: 'rPW86 (2009), 1.851/15' },
    // x² = 4(6π²)^(2/3) s², and the energy per volume of a channel is −(3/4)(6/π)^(1/3) n_σ^(4/3)
    {
      values: [(0.0042 * 4 * Math.cbrt(6 * Math.PI ** 2) ** 2) / (0.75 * Math.cbrt(6 / Math.PI))],
      name: 'B88 (1988), β = 0.0042',
    },
  ],
  'exchange-large-s': [
    { values: [1.804], name: '1 + κ, κ = 0.804 (PBE 1996)' },
    { values: [1.80436], name: '1 + κ, κ = 0.80436' },
    { values: [2.245], name: '1 + κ, κ = 1.245 (revPBE 1998)' },
    { values: [1.552], name: '1 + κ, κ = 0.552 (SOGGA 2008)' },
    { values: [0], name: 'decays to zero' },
    { values: [1], name: 'that of the uniform gas' },
  ],
  'correlation-gradient': [
    { values: [0], name: 'none' },
    { values: [pbeBeta], name: 'PBE with all digits, 0.06672455060314922' },
    { values: [0.066725], name: 'as printed, 0.066725 (Ma, Brueckner 1968)' },
    { values: [0.0667], name: '0.0667' },
    // ν C_c(0), ν = (16/π)(3π²)^(1/3), C_c(0) = 0.004235
    { values: [(16 / Math.PI) * Math.cbrt(3 * Math.PI ** 2) * 0.004235], name: 'ν C_c(0), C_c(0) = 0.004235' },
    { values: [0.046], name: 'PBEsol (2008), 0.046' },
  ],
  'pbe-gamma': [
    { values: [gamma], name: '(1 − ln 2)/π²' },
    { values: [0.031091], name: 'as printed, 0.031091' },
  ],
  'gas-high-density': [
    { values: [0], name: 'none: finite' },
    { values: [gamma], name: '(1 − ln 2)/π² (Gell-Mann, Brueckner 1957)' },
    { values: [0.031091], name: 'as PW92 prints it, 0.031091' },
    { values: [0.0310907], name: '0.0310907 (VWN 1980; PW92 with full digits)' },
    { values: [0.0311], name: 'as PZ81 print it, 0.0311' },
  ],
  'gas-correlation': [
    { values: [-0.04475959003078596, -0.04073970650092738, -0.02390936429150808], name: 'PW92 as printed' },
    { values: [-0.04475949734441542, -0.0407396232044559, -0.02390948761108119], name: 'PW92 with full digits' },
    { values: [-0.04478278861462183, -0.04088558832085469, -0.023857184837738], name: 'VWN5' },
    {
      values: [-0.06246399905834879, -0.05808742521903363, -0.04249301200364012],
      name: 'VWN of the random-phase approximation',
    },
    { values: [-0.04509121363384835, -0.04048881687813473, -0.02408976149260618], name: 'PZ81' },
    { values: [-0.05447832505471938, -0.0510354575660026, -0.03876798528378127], name: 'Gunnarsson, Lundqvist 1976' },
    { values: [-0.04836762553653342, -0.04836762553653342, -0.04836762553653342], name: 'Hedin, Lundqvist 1971' },
    { values: [-0.04342981216624124, -0.03914346254092156, -0.02387053223127513], name: 'Chachiyo 2016' },
    { values: [0, 0, 0], name: 'none' },
  ],
};
