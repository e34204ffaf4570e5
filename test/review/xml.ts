/** A strict reader of the XML that sheets use: elements, double-quoted attributes, text, the five named entities (XML 1.0). */

export interface XmlElement {
  name: string;
  attributes: Record<string, string>;
  children: XmlElement[];
  /** Of the element itself, its children's apart. */
  text: string;
}

const TAG = /^<(\/?)([\w:-]+)((?:\s+[\w:-]+="[^"<]*")*)\s*(\/?)>/;
const ENTITIES: Record<string, string> = { amp: "&", lt: "<", gt: ">", quot: '"', apos: "'" };

/** @throws for whatever is not well-formed */
export function parseXml(source: string): XmlElement {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they must not be there
  if (/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/.test(source) || /[\ud800-\udfff]/u.test(source))
    throw new Error("has a character that XML cannot hold");
  const root: XmlElement = { name: "", attributes: {}, children: [], text: "" };
  const open = [root];
  for (let rest = source; rest !== ""; ) {
    const inner = open[open.length - 1];
    if (!rest.startsWith("<")) {
      const end = rest.indexOf("<");
      inner.text += plain(end < 0 ? rest : rest.slice(0, end));
      rest = end < 0 ? "" : rest.slice(end);
      continue;
    }
    const tag = TAG.exec(rest);
    if (!tag) throw new Error(`no tag: ${rest.slice(0, 80)}`);
    rest = rest.slice(tag[0].length);
    const [, closing, name, attributes, empty] = tag;
    if (closing) {
      if (inner.name !== name) throw new Error(`${inner.name} is closed as ${name}`);
      open.pop();
      continue;
    }
    const element: XmlElement = { name, attributes: attributesOf(attributes), children: [], text: "" };
    inner.children.push(element);
    if (!empty) open.push(element);
  }
  if (open.length !== 1 || root.children.length !== 1) throw new Error("is not one element");
  return root.children[0];
}

/** The element and all within it. */
export const allOf = (element: XmlElement): XmlElement[] => [element, ...element.children.flatMap(allOf)];

function attributesOf(text: string): Record<string, string> {
  const entries = [...text.matchAll(/([\w:-]+)="([^"]*)"/g)].map(
    ([, key, value]) => [key, plain(value)] as const,
  );
  if (new Set(entries.map(([key]) => key)).size < entries.length) throw new Error("an attribute twice");
  return Object.fromEntries(entries);
}

const plain = (text: string): string =>
  text.replace(/&(\w*);?/g, (whole, name: string) => {
    if (!(name in ENTITIES) || !whole.endsWith(";")) throw new Error(`unknown entity ${whole}`);
    return ENTITIES[name];
  });
