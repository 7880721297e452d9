/** Words of the help that several commands share. */
export const BRIEF = "a brief's path, or a brief's name on the shelf";
export const OUTLINE = "an outline as CSV, DXF, SVG or GDSII, a design's JSON, or front.json#ID";
export const UNIT = 'unit of drawings that state none: um, mm, cm, m or in';
export const ID = "a design of that file, or without it of the brief's own results";
export const EXACT = "the sphere's exact fields, for large particles near the detector";
export const AS_JSON = 'print one JSON document';

/** Limits of `search.seed`, and of other seeds. */
export const SEEDS = [0, 2 ** 31 - 1] as const;

/** Takes the exit code of the command that ran. */
export type Done = (code: number) => void;
