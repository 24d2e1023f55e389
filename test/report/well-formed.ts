/**
 * Reads a document as XML's grammar of elements, attributes, references and CDATA wants it; returns its element names, attributes
 * and texts, references resolved. Throws where tags don't balance, an attribute is repeated or unquoted, or a bare < or & stands.
 */
export interface Element {
  readonly name: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: Element[];
  text: string;
}

const TOKEN = /<!\[CDATA\[([\s\S]*?)\]\]>|<\/([\w:-]+)\s*>|<([\w:-]+)((?:\s+[\w:-]+="[^"<]*")*)\s*(\/?)>|([^<]+)/y;
// biome-ignore lint/suspicious/noControlCharactersInRegex: what XML 1.0 forbids
const FORBIDDEN = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/;

export function parsed(xml: string): Element {
  if (FORBIDDEN.test(xml) || !xml.isWellFormed()) throw new Error('a character that XML forbids');
  const root: Element = { name: '', attributes: {}, children: [], text: '' };
  const open = [root];
  TOKEN.lastIndex = 0;
  while (TOKEN.lastIndex < xml.length) {
    const at = TOKEN.lastIndex;
    const match = TOKEN.exec(xml);
    if (!match) throw new Error(`not markup at ${at}: ${xml.slice(at, at + 60)}`);
    const [, cdata, closing, opening, attributes = '', selfClosing, text] = match;
    const top = open.at(-1)!;
    if (cdata !== undefined) top.text += cdata;
    else if (text !== undefined) top.text += resolved(text);
    else if (closing !== undefined) {
      if (top.name !== closing) throw new Error(`</${closing}> closes <${top.name}>`);
      open.pop();
    } else if (opening !== undefined) {
      const element: Element = { name: opening, attributes: attributesOf(attributes), children: [], text: '' };
      top.children.push(element);
      if (selfClosing === '') open.push(element);
    }
  }
  if (open.length > 1) throw new Error(`<${open.at(-1)!.name}> stays open`);
  if (root.children.length !== 1 || root.text.trim() !== '') throw new Error('not one root element');
  return root.children[0]!;
}

/** The element and all below it, in document order. */
export const allOf = (element: Element): Element[] => [element, ...element.children.flatMap(allOf)];

function attributesOf(source: string): Record<string, string> {
  const attributes: Record<string, string> = {};
  for (const [, name = '', value = ''] of source.matchAll(/([\w:-]+)="([^"]*)"/g)) {
    if (name in attributes) throw new Error(`${name} twice`);
    attributes[name] = resolved(value);
  }
  return attributes;
}

const ENTITIES: Record<string, string> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" };

const resolved = (text: string): string =>
  text.replace(/&(?:(\w+);|#(\d+);)?/g, (whole, name?: string, code?: string) => {
    const character = name === undefined ? code && String.fromCodePoint(Number(code)) : ENTITIES[name];
    if (!character) throw new Error(`a bare & or unknown reference: ${whole}`);
    return character;
  });
