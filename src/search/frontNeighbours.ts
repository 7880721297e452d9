import type { Member } from './frontMember.ts';
import type { FrontPopulation } from './frontPopulation.ts';

/** Points around a place on the front, and what a local fit needs of them. */
export interface FrontNeighbours {
  /** The nearest along the front first; only allowed ones. */
  members: Member[];
  /** One a member: 1, and how far it is from the place along the front. */
  rows: number[][];
  /** Mean of the objectives of each, in units of the spans: how far it is from the best corner. */
  heights: number[];
}

/**
 * The points nearest to a place along the front.
 *
 * @param count how many at most
 * @param withBeaten whether points that were beaten of late may be among them
 */
export function frontNeighbours(
  population: FrontPopulation,
  along: readonly number[],
  count: number,
  withBeaten: boolean,
): FrontNeighbours {
  const { known, alongs, members } = population;
  const found: Member[] = [];
  const distances: number[] = [];
  const width = along.length;
  const end = withBeaten ? known.length : members.length;
  for (let k = 0; k < end; k++) {
    let squared = 0;
    for (let j = 0; j < width; j++) squared += (alongs[width * k + j] - along[j]) ** 2;
    if ((found.length === count && squared >= distances[count - 1]) || known[k].violation > 0) continue;
    if (found.length === count) {
      found.pop();
      distances.pop();
    }
    let at = found.length;
    while (distances[at - 1] > squared) at--;
    found.splice(at, 0, known[k]);
    distances.splice(at, 0, squared);
  }
  return {
    members: found,
    rows: found.map((member) => [1, ...member.along.map((v, j) => v - along[j])]),
    heights: found.map(({ place }) => place.reduce((sum, x) => sum + x, 0) / place.length),
  };
}

/** A row, and the products of each two of its numbers but the first: for fits that bend. */
export function bent(row: readonly number[]): number[] {
  const result = row.slice();
  for (let i = 1; i < row.length; i++) for (let j = i; j < row.length; j++) result.push(row[i] * row[j]);
  return result;
}
