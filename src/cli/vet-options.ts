import type { VetFormat } from './formats.ts';

/** The options of `rungcheck vet` as they were given. */
export interface VetOptions extends TellOptions {
  readonly domain?: string;
  readonly only?: readonly string[];
  readonly constants?: readonly string[];
  readonly set?: readonly string[];
  /** A project file; false with --no-project. */
  readonly project?: string | false;
  readonly jobs?: string;
  readonly shard?: string;
  /** A folder; false with --no-cache. */
  readonly cache?: string | false;
  readonly watch?: boolean;
  readonly prove?: boolean;
  /** Boxes for each proof. */
  readonly boxes?: string;
}

/** The options on what becomes of findings, which `rungcheck merge` has as well. */
export interface TellOptions {
  readonly format: VetFormat;
  readonly out?: string;
  readonly write?: readonly string[];
  readonly record?: string;
  readonly against?: string;
  readonly constraints?: readonly string[];
  readonly exitZero?: boolean;
}
