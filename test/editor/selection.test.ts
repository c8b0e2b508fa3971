import { expect, test } from "vitest";
import { selections } from "../../server/editor/selection.ts";
import { cursorIn } from "./fixture.ts";
import { held, inOneGo } from "./spans.ts";

function grown(text: string): readonly string[] {
  const { farm, cursor } = cursorIn(text);
  const [spans] = inOneGo(selections(farm, [cursor]));
  return spans!.map((span) => held(farm, span));
}

test("from a number to its quantity, item, statement, line, month, log, file", () => {
  expect(
    grown(`
# é 水 🪸
log vat
  2026-10-31 read pH 8.1
  2026-11-01 08:00 read calcium 4|20 mg/L ± 6 mg/L, pH 8.1 by ao # 🪸
  2026-11-02 read pH 8.1

store
`),
  ).toEqual([
    "420",
    "420 mg/L ± 6 mg/L",
    "calcium 420 mg/L ± 6 mg/L",
    "2026-11-01 08:00 read calcium 420 mg/L ± 6 mg/L, pH 8.1 by ao",
    "  2026-11-01 08:00 read calcium 420 mg/L ± 6 mg/L, pH 8.1 by ao # 🪸",
    "  2026-11-01 08:00 read calcium 420 mg/L ± 6 mg/L, pH 8.1 by ao # 🪸\n  2026-11-02 read pH 8.1",
    "log vat\n  2026-10-31 read pH 8.1\n  2026-11-01 08:00 read calcium 420 mg/L ± 6 mg/L, pH 8.1 by ao # 🪸\n  2026-11-02 read pH 8.1",
    "# é 水 🪸\nlog vat\n  2026-10-31 read pH 8.1\n  2026-11-01 08:00 read calcium 420 mg/L ± 6 mg/L, pH 8.1 by ao # 🪸\n  2026-11-02 read pH 8.1\n\nstore\n",
  ]);
});

test("a name of a fact, a comment, an unread line, an empty one", () => {
  const text = (line: string) => `system vat\n${line}\n`;
  expect(grown(text("  tank ma|in 500 L"))).toEqual([
    ...["main", "tank main 500 L", "  tank main 500 L"],
    ...["system vat\n  tank main 500 L", "system vat\n  tank main 500 L\n"],
  ]);
  expect(grown(text("  tank main 500 L # b|ig"))).toEqual([
    ...["# big", "  tank main 500 L # big"],
    ...["system vat\n  tank main 500 L # big", "system vat\n  tank main 500 L # big\n"],
  ]);
  expect(grown(text("  tankk ma|in 500"))).toEqual([
    ...["main", "tankk main 500", "  tankk main 500"],
    ...["system vat\n  tankk main 500", "system vat\n  tankk main 500\n"],
  ]);
  expect(grown("system vat\n|\n")).toEqual(["", "system vat\n\n"]);
});
