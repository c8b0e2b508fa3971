/**
 * The words of the language: what a line is cut into before it is read. Every keyword is a token of its own;
 * whether a word is a keyword, a name or a unit is decided by where it stands, so a word may be several.
 */
import { createToken, type IToken, Lexer, type TokenType } from "chevrotain";
import type { Span } from "./syntax.ts";

/** What `\s` is here: spaces of every width, tabs, stray line ends, a byte order mark. */
const space = "[\\s\\u180e\\u200b\\u2060\\ufeff]";
/** Letters beyond ASCII, and what continues an astral one. They make a word, though never a name. */
const letter = "\\u00aa\\u00ba\\u00c0-\\u00d6\\u00d8-\\u00f6\\u00f8-\\u1fff\\u3040-\\ud7ff\\uf900-\\ufaff";

const onlyBlank = new RegExp(`^${space}*$`);
/** True where there is nothing but space of any kind. */
export const isBlank = (text: string): boolean => onlyBlank.test(text);

/** Abstract: any word that may be a name. */
export const nameWord = createToken({ name: "a name", pattern: Lexer.NA });
/** Abstract: any word that may be a unit, or a part of one between strokes. */
export const unitWord = createToken({ name: "a unit", pattern: Lexer.NA });

const strayWord = createToken({
  name: "a word with other letters",
  pattern: new RegExp(
    `[${letter}][A-Za-z0-9_\\-${letter}]*|[A-Za-z][A-Za-z0-9_-]*[${letter}][A-Za-z0-9_\\-${letter}]*`,
  ),
  line_breaks: false,
});
export const plainWord = createToken({
  name: "a word",
  pattern: /[A-Za-z][A-Za-z0-9_-]*/,
  categories: [nameWord, unitWord],
});
/** Units with a sign that names can't have: `µmol`, `m²`, `°C`, `%`. */
const signUnit = createToken({
  name: "a unit with a sign",
  pattern: /[µμ][A-Za-z]+|°[A-Za-z]*|[A-Za-z]+[²³]|[℃℉%‰]/,
  categories: [unitWord],
});

/** The header words, each of which opens a section, and `use`. */
const headerWords = ["system", "log", "solution", "reagent", "store", "saltwater", "kit", "use"] as const;

/** The words that statements are made of. A word may stand here and still be read as a name: see below. */
const statementWords = [
  ...["tank", "round", "cone", "times", "displace", "at", "measured", "volume", "hold", "to", "aim"],
  ...[
    "limit",
    "rise",
    "fall",
    "swing",
    "dose",
    "max",
    "min",
    "cohort",
    "pieces",
    "uptake",
    "each",
    "magnesium",
  ],
  ...[
    "grows",
    "skeleton",
    "air",
    "CO2",
    "light",
    "between",
    "and",
    "evaporates",
    "feeds",
    "protein",
    "top-off",
  ],
  ...["flows-through", "with", "pump", "gives", "least", "always", "holding", "by-hand", "read", "below"],
  ...["disregard", "set", "gave", "renewed", "topped", "stocked", "removed", "moved", "filled", "level"],
  ...["calibrated", "in", "stopped", "started", "note", "dissolve", "saturated", "make", "up", "keep"],
  ...["supplies", "as", "carbonate", "bicarbonate", "hydroxide", "acknowledge", "caustic", "is", "purity"],
  ...["formula", "reorder-below", "lead", "received", "lot", "counted", "mixed", "discarded", "scatter"],
  ...["tolerance", "checked", "against", "by", "from", "until"],
] as const;

export type Keyword = (typeof headerWords)[number] | (typeof statementWords)[number];

/** Keywords that can only follow another word, so that a name of the same spelling confuses nobody. */
const alsoNames: ReadonlySet<string> = new Set([
  ...[
    "CO2",
    "carbonate",
    "bicarbonate",
    "hydroxide",
    "caustic",
    "pieces",
    "protein",
    "purity",
    "volume",
    "up",
  ],
  "magnesium",
]);
const alsoUnits: ReadonlySet<string> = new Set(["min"]);
/** Other spellings that are read and tidied. */
const alsoSpelt: Readonly<Partial<Record<Keyword, RegExp>>> = { pieces: /pieces?/ };

function keywordToken(word: Keyword): TokenType {
  return createToken({
    // Rules are named by keywords too, and the parser wants a name of one or the other.
    name: `the word ${word}`,
    label: word,
    pattern: alsoSpelt[word] ?? word,
    longer_alt: plainWord,
    categories: [...(alsoNames.has(word) ? [nameWord] : []), ...(alsoUnits.has(word) ? [unitWord] : [])],
  });
}

export const keywords: readonly Keyword[] = [...headerWords, ...statementWords];
export const keyword = Object.fromEntries(keywords.map((word) => [word, keywordToken(word)])) as Readonly<
  Record<Keyword, TokenType>
>;

/** True where no name may be spelt like this. */
export const isReserved = (word: string): boolean => Object.hasOwn(keyword, word) && !alsoNames.has(word);

export const cross = createToken({ name: "x", pattern: /×|x/, longer_alt: plainWord });
export const comma = createToken({ name: ",", pattern: "," });
export const stroke = createToken({ name: "/", pattern: "/" });
export const plusMinus = createToken({ name: "±", pattern: /±|\+\/?[-−]/ });
export const asCaCO3 = createToken({
  name: "as CaCO3",
  pattern: new RegExp(`as${space}+[Cc][Aa][Cc][Oo]3(?![A-Za-z0-9_-])`),
  line_breaks: false,
});

/** A text in quotes. A straight opening may hold curly quotes; a curly one ends at the next quote of any kind. */
export const quoted = createToken({
  name: "a text in quotes",
  pattern: /"[^"\r\n]*"|[“”„][^“”„"\r\n]*[“”"]|"[^"“”\r\n]*[“”]/,
  line_breaks: false,
});
export const unclosed = createToken({
  name: "an unclosed text",
  pattern: /["“”„][^\r\n]*/,
  line_breaks: false,
});

/** Whatever looks like a date; `dates.ts` says which is one. */
export const dateWord = createToken({
  name: "a date",
  pattern: new RegExp(
    ["-", "\\.", "\\/", "[\\u2010-\\u2015\\u2212]"]
      .flatMap((mark) => [
        `\\d{4}${mark}\\d{1,2}${mark}\\d{1,2}(?!\\d)`,
        `\\d{1,2}${mark}\\d{1,2}${mark}(?:\\d{4}|\\d{2})(?!\\d)`,
      ])
      .join("|"),
  ),
});
/** Whatever looks like a time of day. A `T` in front joins it to its date. */
export const timeWord = createToken({
  name: "a time",
  pattern: /[Tt]?\d{1,2}:\d{1,2}(?::\d{1,2})?(?: ?[AaPp][Mm](?![A-Za-z0-9_-]))?/,
});
/** Whatever looks like a number; `numbers.ts` says which is plain. A digit, comma, digit is never a list. */
export const numberWord = createToken({
  name: "a number",
  pattern: new RegExp(
    [
      // Thousands set apart by a space: read as one word, so that it can be answered as one.
      "[-+−]?\\d{1,3}(?:[ \\u00a0\\u2009\\u202f]\\d{3})+(?:[.,]\\d+)?(?![\\d:]|[-.,/]\\d)",
      "[-+−]?\\.?\\d+(?:[.,'’]\\d+)*(?:[eE][-+−]?\\d+(?![A-Za-z0-9_]))?(?:\\.(?![A-Za-z0-9.]))?",
    ].join("|"),
  ),
});

const formulaPart = "[A-Za-z0-9()\\[\\]\\u2080-\\u2089]+";
const formulaPattern = new RegExp(
  `(?!purity(?![A-Za-z0-9]))${formulaPart}(?:${space}*[·.•⋅∙*]${space}*${formulaPart})*`,
  "y",
);
/** A chemical formula, which only stands right after the word `formula`. */
export const formulaWord = createToken({
  name: "a formula",
  pattern: (text: string, offset: number, before: IToken[]) => {
    if (before.at(-1)?.tokenType !== keyword.formula) return null;
    formulaPattern.lastIndex = offset;
    return formulaPattern.exec(text);
  },
  line_breaks: false,
  start_chars_hint: [
    ..."ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789([",
    "₀",
    "₁",
    "₂",
    "₃",
  ],
});

const blank = createToken({
  name: "blank",
  pattern: new RegExp(`${space}+`),
  group: Lexer.SKIPPED,
  line_breaks: false,
});
/** To the line's very end: what stands after a stray carriage return in it is no statement. */
const comment = createToken({ name: "comment", pattern: /#[^\n]*/, group: "comments", line_breaks: false });
/** Anything else, an astral character whole, so that no span splits one. */
const stray = createToken({
  name: "a stray character",
  pattern: /[\ud800-\udbff][\udc00-\udfff]|[\0-\uffff]/,
  line_breaks: false,
});

const longestFirst = [...keywords].sort((a, b) => b.length - a.length).map((word) => keyword[word]);

/** In the order tried. */
export const vocabulary: readonly TokenType[] = [
  blank,
  ...[comment, quoted, unclosed],
  ...[dateWord, timeWord, plusMinus, formulaWord, numberWord],
  ...[asCaCO3, signUnit, strayWord],
  ...longestFirst,
  ...[cross, plainWord, comma, stroke, stray],
  ...[nameWord, unitWord],
];

/** Not checked when built: a test checks it, so that starting costs nothing. */
export const lexerSettings = { positionTracking: "onlyOffset", ensureOptimizations: true } as const;

let lexer: Lexer | undefined;

export interface Cut {
  readonly tokens: IToken[];
  readonly comment: Span | null;
}

/** Cuts a line into its words; never fails, since any character is a word at worst. */
export function cut(text: string): Cut {
  lexer ??= new Lexer([...vocabulary], { ...lexerSettings, skipValidations: true });
  const { tokens, groups } = lexer.tokenize(text);
  const first = groups.comments?.[0] as IToken | undefined;
  return { tokens, comment: first ? { start: first.startOffset, end: text.length } : null };
}

export const spanOf = (token: IToken): Span => ({
  start: token.startOffset,
  end: token.startOffset + token.image.length,
});
