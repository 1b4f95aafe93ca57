// Where in the text of a JSON file a value stands, so that an error can name the line.

import { findNodeAtLocation, type JSONPath, type Node } from 'jsonc-parser';

/** Line of a character position, from one. */
export function lineAt(text: string, offset: number): number {
  let line = 1;
  for (let at = text.indexOf('\n'); at >= 0 && at < offset; at = text.indexOf('\n', at + 1)) line++;
  return line;
}

/** The path as people write it, `turbines[1].hub_height_m`; empty for the whole file. */
export function pathInWords(path: JSONPath): string {
  return path
    .map((step) => (typeof step === 'number' ? `[${step}]` : `.${step}`))
    .join('')
    .replace(/^\./u, '');
}

/** Line of the value at a path; of the nearest thing around it when the file has none there. */
export function lineOf(root: Node, text: string, path: JSONPath): number {
  for (let length = path.length; length >= 0; length--) {
    const node = findNodeAtLocation(root, path.slice(0, length));
    if (node === undefined) continue;
    // A key's value may begin lines below it: the key is what people look for.
    const property = node.parent?.type === 'property' ? node.parent : node;
    return lineAt(text, property.offset);
  }
  return 1;
}
