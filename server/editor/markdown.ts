/** Markdown for hovers: words of a file can't become markup, and the whole reads well where markup isn't drawn. */

/** What hides, splits or turns round the text that it stands in; nothing of it can be seen. */
// biome-ignore lint/suspicious/noControlCharactersInRegex: these are what is taken out
const unseen = /[\u0000-\u001f\u007f-\u009f\u2028\u2029\u202a-\u202e\u2066-\u2069\ufffe\uffff]/g;

/** What would begin a heading, a quote, a list or a rule at the start of a line. */
const opening = /^(\s*)(?:([#+=-])|(\d+)([.)])(?=\s|$))/;

/**
 * A text of a file as it stands, with nothing in it that Markdown (also with tables, bare links, struck out words,
 * formulas) or HTML would take for its own. Safe at the start of a line and inside one.
 */
export const escaped = (text: string): string =>
  escapedInside(text).replace(opening, (_, space, sign, number, mark) =>
    sign ? `${space}\\${sign}` : `${space}${number}\\${mark}`,
  );

/** The same for a text that is never the first on its line. */
export const escapedInside = (text: string): string =>
  text
    .replace(unseen, " ")
    .replace(/[\\`*_[\]~|$]/g, "\\$&")
    .replaceAll("&", "&amp;")
    .replaceAll("<", "&lt;")
    .replaceAll(">", "&gt;")
    .replace(/:(?=\/\/)|@|(?<=\bwww)\./gi, "\\$&");

/** Lines of Marl, to be copied as they are. */
export function marlBlock(lines: string): string {
  const longest = Math.max(2, ...[...lines.matchAll(/`+/g)].map(([ticks]) => ticks.length));
  const fence = "`".repeat(longest + 1);
  return `${fence}marl\n${lines}\n${fence}`;
}

/** Words of Marl inside a sentence; a text with a backtick in it is no such word. */
export const marlWords = (words: string): string => (words.includes("`") ? escaped(words) : `\`${words}\``);

const entities: Readonly<Record<string, string>> = { lt: "<", gt: ">", amp: "&" };

const markup = new RegExp(
  [
    /^(`{3,})marl\n([\s\S]*?)\n\1$/,
    /\\([!-/:-@[-`{-~])/,
    /`([^`\n]*)`/,
    /\[([^\]\n]*)\]\([^)\n]*\)/,
    /&(lt|gt|amp);/,
    / {2}(?=\n)/,
    /\*\*/,
  ]
    .map(({ source }) => source)
    .join("|"),
  "gm",
);

/** The same without markup, for clients that draw none. */
export const plainText = (markdown: string): string =>
  markdown.replace(markup, (_, __, block, sign, code, link, entity) => {
    if (link !== undefined) return plainText(link);
    return block ?? sign ?? code ?? (entity ? entities[entity] : "");
  });
