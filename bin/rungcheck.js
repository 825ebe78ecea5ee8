#!/usr/bin/env node
import { existsSync } from 'node:fs';

const program = new URL('../dist/cli.js', import.meta.url);

if (existsSync(program)) {
  await import(program.href);
} else {
  process.stderr.write('rungcheck is not built yet: run `npm ci`, or `npm run build`, in its folder.\n');
  process.exitCode = 2;
}
