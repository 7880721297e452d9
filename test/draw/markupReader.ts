/** An element of an XML text. */
export interface MarkupNode {
  name: string;
  attributes: Record<string, string>;
  children: MarkupNode[];
  /** Text directly inside, references resolved. */
  text: string;
}

const TOKEN =
  /<\?xml[^>]*\?>|<!DOCTYPE html>|<(\/?)([a-zA-Z][\w-]*)((?:\s+[\w:-]+="[^"<]*")*)\s*(\/?)>|([^<]+)/y;
const BAD_REFERENCE = /&(?!#\d+;|amp;|lt;|gt;|quot;|apos;)/;

/**
 * A small strict reader of XML, written for the tests alone: throws where tags do not match, attributes are not quoted or
 * given twice, or a bare `<` or `&` stands in text.
 */
export function readMarkup(source: string): MarkupNode {
  const root: MarkupNode = { name: '', attributes: {}, children: [], text: '' };
  const open = [root];
  TOKEN.lastIndex = 0;
  while (TOKEN.lastIndex < source.length) {
    const place = TOKEN.lastIndex;
    const match = TOKEN.exec(source);
    if (match === null) throw new Error(`not well-formed: ${source.slice(place, place + 80)}`);
    const [token, closing, name, attributes, empty, text] = match;
    if (BAD_REFERENCE.test(token)) throw new Error(`bare ampersand: ${token.slice(0, 80)}`);
    const parent = open[open.length - 1];
    if (text !== undefined) parent.text += resolve(text);
    else if (closing === '/') {
      if (open.pop()?.name !== name) throw new Error(`</${name}> closes nothing`);
    } else if (name !== undefined) {
      const node = { name, attributes: readAttributes(attributes), children: [], text: '' };
      parent.children.push(node);
      if (empty !== '/') open.push(node);
    }
  }
  if (open.length !== 1 || root.children.length !== 1)
    throw new Error('not exactly one root element, closed');
  return root.children[0];
}

function readAttributes(source: string): Record<string, string> {
  const attributes: Record<string, string> = {};
  for (const [, name, value] of source.matchAll(/([\w:-]+)="([^"]*)"/g)) {
    if (name in attributes) throw new Error(`attribute ${name} twice`);
    attributes[name] = resolve(value);
  }
  return attributes;
}

function resolve(text: string): string {
  return text.replace(/&#(\d+);/g, (_, code) => String.fromCodePoint(Number(code)));
}

/** The node and all nodes below it, in document order. */
export function allNodes(node: MarkupNode): MarkupNode[] {
  return [node, ...node.children.flatMap(allNodes)];
}
