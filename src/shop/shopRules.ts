/** What one shop's process can cut, as plain data that may be sent to a worker. Lengths in metres. */
export interface ShopRules {
  /** The preset's name, as a brief writes it: `photo-etching`. */
  name: string;
  /** One line for tables, with the sheet: `Photo-etched steel, 0.05 mm`. */
  title: string;
  /** `photo-etching`, `laser cutting`, `photomask`, … */
  process: string;
  /** Thickness of the sheet that the other numbers are for; null where it does not enter. */
  thicknessM: number | null;
  /** Narrowest hole or slot. */
  smallestOpeningM: number;
  /** Narrowest bar of sheet left standing between two openings. */
  smallestWebM: number;
  /** Smallest radius in a convex corner of an opening, where the cutter works from inside; 0 for sharp. */
  insideCornerRadiusM: number;
  /** Smallest radius in a reflex corner of an opening, where the sheet pokes into it; 0 for sharp. */
  outsideCornerRadiusM: number;
  /** Width that the cutter takes away; 0 where the drawing is the edge. */
  kerfM: number;
  /** How far an edge may lie from where it is drawn, either way. */
  edgeToleranceM: number;
  /** Step of the writer's grid, to which vertices are rounded; 0 for none. */
  gridM: number;
  /** A piece of sheet inside an opening is `held` by a plate (chrome on glass) or will `fall out`. */
  islands: 'held' | 'fall out';
  /** What to mind before ordering, in whole sentences. */
  cautions: string[];
  /** Where the numbers come from. */
  source: string;
}
