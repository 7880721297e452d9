/** Units that outline files may be in, in metres. */
export const LENGTH_UNITS = { um: 1e-6, mm: 1e-3, cm: 1e-2, m: 1, in: 0.0254 } as const;
export type LengthUnit = keyof typeof LENGTH_UNITS;
