import { readFileSync } from 'node:fs';
import type { Brief } from '../../src/run/brief.ts';
import { readBrief } from '../../src/run/readBrief.ts';
import type { Task } from '../../src/score/task.ts';

/** A brief of the shelf. */
export async function presetBrief(name: string): Promise<Brief> {
  const file = new URL(`../../presets/briefs/${name}.yaml`, import.meta.url);
  return readBrief(readFileSync(file, 'utf8'), `${name}.yaml`);
}

/** Its task, with some parts of it changed. */
export async function presetTask(name: string, changes: Partial<Task> = {}): Promise<Task> {
  return { ...(await presetBrief(name)).task, ...changes };
}
