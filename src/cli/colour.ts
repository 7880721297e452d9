import picocolors from 'picocolors';

/** Colours for one stream: none unless it is a terminal, and none where NO_COLOR is set (no-color.org). */
export function coloursFor(stream: NodeJS.WriteStream): ReturnType<typeof picocolors.createColors> {
  const { NO_COLOR = '', TERM = '' } = process.env;
  return picocolors.createColors(stream.isTTY === true && NO_COLOR === '' && TERM !== 'dumb');
}
