/** Words of a file in Markdown: never markup, and the same words again where no markup is drawn. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { hover } from "../../../server/editor/hover.ts";
import { escaped, marlBlock, marlWords, plainText } from "../../../server/editor/markdown.ts";
import { cursorIn } from "../fixture.ts";

const pairs: readonly (readonly [text: string, markdown: string])[] = [
  ["<script>alert(1)</script>", "&lt;script&gt;alert(1)&lt;/script&gt;"],
  ["[link](http://x.example)", "\\[link\\](http\\://x.example)"],
  ["`code` ``two``", "\\`code\\` \\`\\`two\\`\\`"],
  ["a | b", "a \\| b"],
  ["*bold* _it_ ~~gone~~ $x$", "\\*bold\\* \\_it\\_ \\~\\~gone\\~\\~ \\$x\\$"],
  ["&lt; &amp; &#60;", "&amp;lt; &amp;amp; &amp;#60;"],
  ["http://x.example www.x.example me@x.example", "http\\://x.example www\\.x.example me\\@x.example"],
  ["# heading", "\\# heading"],
  ["- item", "\\- item"],
  ["+0.24 dKH", "\\+0.24 dKH"],
  ["=== rule", "\\=== rule"],
  ["1. first", "1\\. first"],
  ["12) twelfth", "12\\) twelfth"],
  ["7.6 to 8.4 dKH (2.71 meq/L), -0.2", "7.6 to 8.4 dKH (2.71 meq/L), -0.2"],
  ["\\*", "\\\\\\*"],
];

test.each(pairs)("%s", (text, markdown) => {
  expect(escaped(text)).toBe(markdown);
  expect(plainText(markdown)).toBe(text);
});

test("any text of one line comes back as it was, but for what can't be seen", () => {
  fc.assert(
    fc.property(fc.string({ unit: "grapheme-ascii" }), (text) => {
      // Two spaces before a break are the only other thing that plain text drops, and a text holds no break.
      expect(plainText(escaped(text))).toBe(text);
    }),
  );
});

test("characters that hide or turn round what stands beside them become spaces", () => {
  expect(escaped("a\u202eb\u0000c\u2028d")).toBe("a b c d");
});

test("lines of Marl stand as they are, whatever is in them", () => {
  const line = 'note "```` **x** &lt; \\[a\\](b)"';
  expect(plainText(marlBlock(line))).toBe(line);
  expect(plainText(`${marlWords("hold PARAMETER q [aim q]")} and **more**`)).toBe(
    "hold PARAMETER q [aim q] and more",
  );
});

test("names, paths and texts of a file are no markup in a hover", () => {
  const used = cursorIn(
    'us|e "a_[b](c)<i>.marl"\n// file: a_[b](c)<i>.marl\nkit own_kit\n  pH scatter 0.05\n',
  );
  expect(hover(used.farm, used.cursor)?.markdown).toBe(
    'a\\_\\[b\\](c)&lt;i&gt;.marl declares kit own\\_kit.\n\nWritten: `use "text"`',
  );
  const log = cursorIn(
    "system vat\n  tank main 500 L\nlo|g vat\n  2026-11-30 08:00 read calcium 410 mg/L by a_b_\n",
  );
  expect(hover(log.farm, log.cursor)?.markdown).toContain("calcium 410 mg/L by a\\_b\\_");
});
