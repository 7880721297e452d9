import { inputError } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';
import type { PlacedKey } from '../run/briefKeys.ts';
import { allKeys, loadBriefKeys } from '../run/briefKeys.ts';
import type { Command } from './commander.ts';
import { EXIT } from './exit.ts';
import { briefHelp, keyHelp } from './keyHelp.ts';
import { print } from './notes.ts';

/** What stands before a key that has a command's name. */
const OF_BRIEFS = 'brief.';

/** Runs `rimwright help` and gives its exit code. The words of a topic are one key: `placement.spread.diffusing for`. */
export async function run(program: Command, words: readonly string[]): Promise<number> {
  const topic = words.join(' ');
  if (topic === '') {
    print(program.helpInformation());
    return EXIT.done;
  }
  const command = program.commands.find((one) => one.name() === topic);
  const keys = await loadBriefKeys();
  if (command !== undefined) {
    command.outputHelp();
    if (Object.hasOwn(keys, topic)) print(`\nIt is a key of briefs too: rimwright help ${OF_BRIEFS}${topic}`);
    return EXIT.done;
  }
  if (topic === 'brief') {
    print(briefHelp(keys));
    return EXIT.done;
  }
  const known = allKeys(keys);
  const found = meant(topic, known);
  if (found.length === 0) throw unknown(topic, program, known);
  print(found.map(keyHelp).join('\n\n'));
  return EXIT.done;
}

/** The key of that path, or else every key of that name. */
function meant(topic: string, known: readonly PlacedKey[]): PlacedKey[] {
  const path = topic.replace(/\[\d*\]/g, '').replace(OF_BRIEFS, '');
  const exact = known.filter((one) => one.path.join('.') === path);
  return exact.length > 0 ? exact : known.filter((one) => one.path.at(-1) === path);
}

function unknown(topic: string, program: Command, known: readonly PlacedKey[]) {
  const commands = program.commands.map((one) => one.name());
  const paths = known.map(({ path }) => path.join('.'));
  const names = known.flatMap(({ path }) => path.at(-1) ?? []);
  const nearest = nearestName(topic, [...commands, ...paths, ...names]);
  const hint = nearest === undefined ? ' (rimwright help brief lists them)' : ` (did you mean ${nearest}?)`;
  const expected = `a command, or a key of a brief such as light.linewidth${hint}`;
  return inputError([{ key: 'help', found: JSON.stringify(topic.slice(0, 60)), expected }]);
}
