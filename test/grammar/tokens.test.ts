import { Lexer, tokenLabel } from "chevrotain";
import { describe, expect, test } from "vitest";
import { MarlParser } from "../../grammar/parser.ts";
import { statementTable } from "../../grammar/statements.ts";
import {
  cut,
  isReserved,
  keyword,
  keywords,
  lexerSettings,
  spanOf,
  vocabulary,
} from "../../grammar/tokens.ts";

const kinds = (text: string): string[] => cut(text).tokens.map((token) => tokenLabel(token.tokenType));
const words = (text: string): string[] => cut(text).tokens.map((token) => token.image);

describe("what the product doesn't check when it starts", () => {
  test("the lexer is sound, and quick for every first character", () => {
    expect(new Lexer([...vocabulary], lexerSettings).lexerDefinitionErrors).toEqual([]);
  });

  test("the parser's grammar has no two readings", () => {
    expect(() => new MarlParser({ skipValidations: false })).not.toThrow();
  });

  test("every statement of the table has its rule, and every keyword a statement", () => {
    const parser = new MarlParser({ skipValidations: true });
    const names = Object.keys(parser.getGAstProductions());
    for (const row of statementTable) expect(names).toContain(row.rule);
    const inGrammar = JSON.stringify(parser.getSerializedGastProductions());
    for (const word of keywords) expect(inGrammar, word).toContain(`"name":"the word ${word}"`);
  });
});

describe("where one word ends and the next begins", () => {
  test("a keyword inside a longer word is none", () => {
    expect(kinds("to total with within in inch x x-ray top top-off")).toEqual([
      ...["to", "a word", "with", "a word", "in", "a word", "x", "a word", "a word", "top-off"],
    ]);
  });

  test("a number ends where its unit begins", () => {
    expect(words("310mL 5L,10L 8.4dKH -2degC 1e3mL")).toEqual([
      ...["310", "mL", "5", "L", ",", "10", "L", "8.4", "dKH", "-2", "degC", "1", "e3mL"],
    ]);
  });

  test("signs that belong to a unit", () => {
    expect(kinds("µmol μatm m² cm³ °C ℃ % ‰")).toEqual(Array(8).fill("a unit with a sign"));
  });

  test("`×` needs no space, `x` does", () => {
    expect(words("240×90 x 32")).toEqual(["240", "×", "90", "x", "32"]);
    expect(words("240x90")).toEqual(["240", "x90"]);
  });

  test("a `#` inside quotes is no comment", () => {
    const { tokens, comment } = cut('note "tank # 3" # really');
    expect(tokens.map((token) => token.image)).toEqual(["note", '"tank # 3"']);
    expect(comment).toEqual({ start: 16, end: 24 });
  });

  test("an astral character is one word", () => {
    expect(cut("a 🐠b").tokens.map(spanOf)).toEqual([
      { start: 0, end: 1 },
      { start: 2, end: 4 },
      { start: 4, end: 5 },
    ]);
  });

  test("a formula stands after `formula` only", () => {
    expect(words("formula SrCl2·6H2O purity")).toEqual(["formula", "SrCl2·6H2O", "purity"]);
    expect(words("formula Ca(OH)2")).toEqual(["formula", "Ca(OH)2"]);
    expect(words("is SrCl2·6H2O")).toEqual(["is", "SrCl2", "·", "6", "H2O"]);
  });
});

test("parameters and units may be names, keywords may not", () => {
  for (const word of ["alkalinity", "pH", "total", "mL", "day", "volume", "magnesium"])
    expect(isReserved(word)).toBe(false);
  for (const word of ["tank", "min", "with", "by"]) expect(isReserved(word)).toBe(true);
  expect(Object.keys(keyword)).toHaveLength(new Set(keywords).size);
});
