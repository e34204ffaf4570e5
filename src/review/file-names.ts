/** Names of files for things that may be called anything. */

/** Path separators, what file systems or shells forbid or read otherwise, controls, and marks that turn or hide text. */
const UNSAFE =
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is looked for
  /[\u0000-\u0020"*/:<>?\\|\u007f-\u00a0\u00ad\u061c\u200b-\u200f\u2028-\u202e\u2060-\u206f\ufeff\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g;

/** Files of these names cannot be made on some systems (Microsoft Learn, "Naming Files, Paths, and Namespaces"). */
const DEVICE = /^(con|prn|aux|nul|com\d|lpt\d)(\.|$)/i;

/** Of four bytes each at most, these leave room for an ending within the 255 bytes of common file systems. */
const MOST_CHARACTERS = 50;

/**
 * A name for each, without an ending, that is one file within a folder on any system: what is unsafe becomes "-", what is empty then is called by
 * its number, and of names that differ in nothing but their case the later ones get a number behind.
 *
 * @param taken names that are others'
 */
export function fileNames(names: readonly string[], kind: string, taken: readonly string[] = []): string[] {
  const used = new Set(taken.map(folded));
  return names.map((name, i) => {
    const safe = safeName(name) || `${kind}-${i + 1}`;
    let free = safe;
    for (let n = 2; used.has(folded(free)); n++) free = `${safe}-${n}`;
    used.add(folded(free));
    return free;
  });
}

function safeName(name: string): string {
  const plain = name.normalize("NFC").replace(UNSAFE, "-").replace(/-{2,}/g, "-");
  const short = Array.from(plain).slice(0, MOST_CHARACTERS).join("");
  // neither hidden, nor an option, nor shortened by a system that drops dots at the end
  const trimmed = short.replace(/^[-.]+/, "").replace(/[-.]+$/, "");
  return DEVICE.test(trimmed) ? `${trimmed.replace(/\..*$/, "")}-` : trimmed;
}

const folded = (name: string): string => name.normalize("NFC").toLowerCase();
