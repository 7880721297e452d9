/** Order for sorting: smaller first. A difference would be NaN for two infinities. */
export function ascending(a: number, b: number): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
