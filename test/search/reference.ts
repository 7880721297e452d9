import optimisation from '../reference/optimisation.json' with { type: 'json' };

/** Published values whose id begins so, each with its inputs and source. */
// biome-ignore lint/suspicious/noExplicitAny: entries differ in shape; each test knows its own
export function published(prefix: string): any[] {
  const found = optimisation.values.filter((entry) => entry.id.startsWith(prefix));
  if (found.length === 0) throw new Error(`no published value ${prefix}`);
  return found;
}
