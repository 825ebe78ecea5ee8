import { spawnSync } from 'node:child_process';
import { describe, expect, test } from 'vitest';
import { run } from './stand-in.ts';

const script = async (shell: string) => (await run(['completion', shell])).out;
const has = (shell: string) => spawnSync(shell, ['-c', 'true']).status === 0;

/** What bash offers for a command line whose last word is being typed. */
async function offered(...words: readonly string[]): Promise<string[]> {
  const line = words.map((word) => `'${word}'`).join(' ');
  const asked = `${await script('bash')}
COMP_WORDS=(rungcheck ${line}); COMP_CWORD=${words.length}; _rungcheck; printf '%s\\n' "\${COMPREPLY[@]}"`;
  const { stdout, stderr } = spawnSync('bash', ['-c', asked], { encoding: 'utf8' });
  expect(stderr).toBe('');
  return stdout.trim().split('\n');
}

describe('completion in bash, asked of bash itself', () => {
  test('knows commands, options, choices and ids', async () => {
    expect(await offered('ve')).toContain('vet');
    expect(await offered('vet', '--ag')).toEqual(['--against']);
    expect(await offered('vet', '--format', 'ju')).toEqual(['junit']);
    expect(await offered('vet', 'pbes')).toEqual(['pbesol']);
    expect(await offered('vet', '--only', 'lieb')).toContain('lieb-oxford');
    expect(await offered('explain', 'lieb')).toContain('lieb-oxford');
    expect(await offered('completion', 'z')).toEqual(['zsh']);
  });
});

describe('completion in other shells', () => {
  test.each(['zsh', 'fish'])('%s accepts its script, where it is installed', async (shell) => {
    const text = await script(shell);
    expect(text).toContain('--against'.replace('--', shell === 'fish' ? '-l ' : '--'));
    if (!has(shell)) return;
    expect(spawnSync(shell, ['-n'], { input: text, encoding: 'utf8' })).toMatchObject({ status: 0, stderr: '' });
  });
});
