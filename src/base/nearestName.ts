/**
 * The known name that a mistyped one most likely means, or undefined where none comes close. Case, `-` and `_` do not count.
 *
 * @param known in the order of preference among equally near names
 */
export function nearestName(typed: string, known: readonly string[]): string | undefined {
  const plain = bare(typed);
  let nearest: string | undefined;
  // A third of the letters may be wrong: more would turn one word into another.
  let least = Math.max(1, Math.floor(plain.length / 3)) + 1;
  for (const name of known) {
    const steps = editSteps(plain, bare(name));
    if (steps < least) {
      least = steps;
      nearest = name;
    }
  }
  return nearest;
}

function bare(name: string): string {
  return name.slice(0, 60).toLowerCase().replace(/[-_]/g, '');
}

/** Letters to insert, delete or replace to turn one word into the other (Levenshtein 1966). */
function editSteps(from: string, to: string): number {
  let row = Array.from({ length: to.length + 1 }, (_, j) => j);
  for (let i = 1; i <= from.length; i++) {
    const next = [i];
    for (let j = 1; j <= to.length; j++) {
      const replaced = row[j - 1] + (from[i - 1] === to[j - 1] ? 0 : 1);
      next.push(Math.min(replaced, row[j] + 1, next[j - 1] + 1));
    }
    row = next;
  }
  return row[to.length];
}
