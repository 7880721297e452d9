/** What every report says before anyone builds, switches on or relies on anything. */
export const CAUTIONS: readonly string[] = [
  'Laser beams can blind and burn. Follow your local codes and regulations, and have the set-up approved by your laser safety officer before switching it on.',
  'Leave cutting and etching to the shop and its licensed practice: it decides about tools, chemicals, ventilation and waste.',
  'Rimwright certifies nothing. All numbers here are computed from the brief: check a built detector with particles of known extinction before relying on it.',
];
