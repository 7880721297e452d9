import { spawnSync } from 'node:child_process';
import { beforeAll, describe, expect, it } from 'vitest';
import { presetNames } from '../../src/base/presetFiles.ts';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { folderWith, runHere } from './runCli.ts';

let script = '';
beforeAll(async () => {
  script = (await runHere(['completion', 'bash'])).stdout;
});

/** What bash offers for a line that ends in what is to be completed. */
function offered(words: readonly string[], folder: string): string[] {
  const line = words.map((word) => `'${word}'`).join(' ');
  const test = `source ./complete.sh
COMP_WORDS=(${line}); COMP_CWORD=${words.length - 1}
$(complete -p rimwright | sed 's/.*-F \\([^ ]*\\).*/\\1/')
printf '%s\\n' "\${COMPREPLY[@]}"`;
  const { stdout, stderr } = spawnSync('bash', ['--norc', '-c', test], { cwd: folder, encoding: 'utf8' });
  expect(stderr).toBe('');
  return stdout.split('\n').filter((word) => word !== '');
}

describe('rimwright completion bash', () => {
  const folder = () => folderWith({ 'complete.sh': script, 'my brief.yaml': '', 'road.csv': '' });

  it('completes commands', () => {
    const here = folder();
    expect(offered(['rimwright', 's'], here)).toEqual(['search', 'smallest']);
    expect(offered(['rimwright', ''], here)).toContain('completion');
  });

  it('completes the options of a command, and no others', () => {
    const here = folder();
    expect(offered(['rimwright', 'search', 'x', '--re'], here)).toEqual(['--resume']);
    expect(offered(['rimwright', 'draw', '--fo'], here)).toEqual(['--formats', '--force']);
    expect(offered(['rimwright', 'draw', '--resu'], here)).toEqual([]);
  });

  it('completes briefs of the shelf beside files, and files alone after an option with a value', () => {
    const here = folder();
    expect(offered(['rimwright', 'search', 'road'], here)).toEqual(['road-dust', 'road.csv']);
    expect(offered(['rimwright', 'search', 'my'], here)).toEqual(['my brief.yaml']);
    expect(offered(['rimwright', 'reading', 'x', '--outline', 'road'], here)).toEqual(['road.csv']);
    expect(offered(['rimwright', 'search', ''], here)).toEqual(
      expect.arrayContaining(presetNames('briefs', presetsFolder())),
    );
  });

  it('completes what is on the shelf, and topics of help', () => {
    const here = folder();
    expect(offered(['rimwright', 'presets', 'me'], here)).toEqual(['media']);
    expect(offered(['rimwright', 'presets', 'shops', 'photom'], here)).toEqual(['photomask']);
    expect(offered(['rimwright', 'help', 'light.line'], here)).toEqual(['light.linewidth']);
  });
});

describe('rimwright completion', () => {
  it('has scripts for zsh and fish that know every command', async () => {
    const commands = offered(['rimwright', ''], folderWith({ 'complete.sh': script }));
    for (const shell of ['zsh', 'fish']) {
      const { code, stdout } = await runHere(['completion', shell]);
      expect(code).toBe(0);
      for (const command of commands.filter((one) => /^\w/.test(one))) expect(stdout).toContain(command);
      // No text breaks out of its quotes.
      const plain = shell === 'fish' ? stdout.replaceAll("\\'", '') : stdout.replaceAll("'\\''", '');
      expect([shell, (plain.match(/'/g) ?? []).length % 2]).toEqual([shell, 0]);
    }
  });

  it('refuses other shells', async () => {
    const { code, stderr } = await runHere(['completion', 'bsh']);
    expect([code, stderr]).toEqual([
      2,
      'completion: found "bsh", expected one of bash, zsh, fish (did you mean bash?)\n',
    ]);
  });
});
