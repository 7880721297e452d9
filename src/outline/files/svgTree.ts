import { SaxesParser } from 'saxes';
import { refuseAt } from './drawnPath.ts';
import type { Attributes } from './svgShape.ts';

/** What reads an SVG on its way through. Names come without the prefix `svg:`. */
export interface SvgVisitor {
  open(name: string, attributes: Attributes, line: number): void;
  close(): void;
}

/**
 * Walks through the elements of an XML text. Entities other than XML's own five are refused, and nothing outside of the file is
 * ever opened.
 *
 * @throws RimwrightError `input` where it is not XML, or has declarations of its own
 */
export function walkSvg(text: string, file: string, visitor: SvgVisitor): void {
  const parser = new SaxesParser();
  parser.on('error', ({ message }) => {
    const reason = message.replace(/^[\d:]+ /, '').slice(0, 200);
    refuseAt(file, { line: parser.line }, `text that is not XML (${reason})`, 'an SVG drawing');
  });
  parser.on('doctype', (declared) => {
    if (!declared.includes('[')) return;
    refuseAt(
      file,
      { line: parser.line },
      'a DOCTYPE with declarations',
      'an SVG without entities of its own',
    );
  });
  parser.on('opentag', ({ name, attributes }) =>
    visitor.open(name.replace(/^svg:/, ''), attributes, parser.line),
  );
  parser.on('closetag', () => visitor.close());
  parser.write(text).close();
}
