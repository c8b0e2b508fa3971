import { describe, expect, test } from "vitest";
import { filesOf } from "../checks/walk.ts";
import { textAfter, titlesAt } from "./actions.ts";

const moves = (text: string, canCreate = true) => titlesAt(text, ["refactor.move"], canCreate);

describe("a log is split by month", () => {
  const head = "system vat\n  tank main 500 L\n  cohort plugs 40 pieces uptake 0.8 meq/day each\n\nlog vat\n";
  const log = `${head}  # October é🐠.
  2026-10-30 08:00 stocked plugs 3 pieces # new

  2026-11-02 08:00 removed plugs 1 pieces
  # A slip:
  2026-10-31 08:00 removed plugs 2 pieces
  2026-10-31 09:00 remoovd plugs 2 pieces
  2026-12-01 07:00 note "all well"
`;

  test("each into a file of its own, with what stands above its lines; the newest stays", () => {
    expect(moves(log.replace("log vat", "log vat|"))).toEqual(["Split this log by month"]);
    expect(textAfter(log.replace("log vat", "log vat|"), "Split this log by month")).toBe(
      `// file: farm.marl
${head}  2026-12-01 07:00 note "all well"
// file: log-2026-10.marl
use "farm.marl"

log vat
  # October é🐠.
  2026-10-30 08:00 stocked plugs 3 pieces # new
  # A slip:
  2026-10-31 08:00 removed plugs 2 pieces
  2026-10-31 09:00 remoovd plugs 2 pieces
// file: log-2026-11.marl
use "farm.marl"

log vat
  2026-11-02 08:00 removed plugs 1 pieces
`,
    );
  });

  test("uses only what its lines need", () => {
    const farm = `# Day book.\nuse "kits.marl"\nuse "vat.marl"\nuse "empty.marl"\n\nlog vat|\n  2026-10-30 read pH 8.1 with bench\n  2026-11-30 read pH 8.1\n  2026-12-01 07:00 note "a"\n`;
    const others = `// file: kits.marl\nkit bench\n  pH scatter 0.1\n// file: vat.marl\nsystem vat\n  tank main 500 L\n// file: empty.marl\n`;
    const texts = filesOf(textAfter(farm + others, "Split this log by month"));
    expect(texts.get("log-2026-10.marl")).toBe(
      'use "kits.marl"\nuse "vat.marl"\n\nlog vat\n  2026-10-30 read pH 8.1 with bench\n',
    );
    expect(texts.get("log-2026-11.marl")).toBe('use "vat.marl"\n\nlog vat\n  2026-11-30 read pH 8.1\n');
    expect(texts.get("farm.marl")).toBe(
      '# Day book.\nuse "kits.marl"\nuse "vat.marl"\nuse "empty.marl"\n\nlog vat\n  2026-12-01 07:00 note "a"\n',
    );
  });

  test("only where files can be made, there is more than one month, and the names are free", () => {
    const split = log.replace("log vat", "log vat|");
    expect(moves(split, false)).toEqual([]);
    expect(moves(`${head}|  2026-11-02 08:00 removed plugs 1 pieces\n`)).toEqual([]);
    const taken = "// file: log-2026-10.marl\n";
    expect(textAfter(split + taken, "Split this log by month")).toContain("// file: log-vat-2026-10.marl\n");
    expect(moves(`${split + taken}// file: log-vat-2026-10.marl\n`)).toEqual([]);
    expect(moves(`${split}<<<<<<< ours\n  2026-10-03 note "a"\n=======\n>>>>>>> theirs\n`)).toEqual([]);
  });
});

describe("a log is sorted by time", () => {
  const head = "system vat\n  tank main 500 L\n  cohort plugs 40 pieces uptake 0.8 meq/day each\n\nlog vat\n";
  const atHead = (text: string) => text.replace("log vat", "|log vat");

  test("with the comments above its lines", () => {
    const text = `${head}  2026-11-29 08:00 note "c" # é🐠
  # About b.
  2026-11-28 08:00 note "b"
  this can't be read

  2026-11-27 note "a"
  2026-11-30 note "d"

# Bench.
kit bench
  pH scatter 0.1
`;
    expect(titlesAt(atHead(text), ["refactor"])).toEqual(["Sort this log by time"]);
    expect(textAfter(atHead(text), "Sort this log by time")).toBe(`${head}
  2026-11-27 note "a"
  # About b.
  2026-11-28 08:00 note "b"
  this can't be read
  2026-11-29 08:00 note "c" # é🐠
  2026-11-30 note "d"

# Bench.
kit bench
  pH scatter 0.1
`);
  });

  test("at the end of a file without a last line end", () => {
    const text = `${head}  2026-11-29 note "c"\n  2026-11-28 note "b"`;
    expect(textAfter(atHead(text), "Sort this log by time")).toBe(
      `${head}  2026-11-28 note "b"\n  2026-11-29 note "c"`,
    );
    const returns = text.replaceAll("\n", "\r\n");
    expect(textAfter(atHead(returns), "Sort this log by time")).toBe(
      `${head}  2026-11-28 note "b"\n  2026-11-29 note "c"`.replaceAll("\n", "\r\n"),
    );
  });

  test("at a line that is told to be out of order too, at no other", () => {
    const text = (first: string, second: string) =>
      `${head}  2026-11-29${first} note "c"\n  2026-11-28${second} note "b"\n`;
    expect(titlesAt(text("", "|"), ["refactor"])).toEqual(["Sort this log by time"]);
    expect(titlesAt(text("|", ""), ["refactor"])).toEqual([]);
  });

  test("only where it is out of order", () => {
    expect(titlesAt(atHead(`${head}  2026-11-28 note "b"\n  2026-11-28 note "a"\n`), ["refactor"])).toEqual(
      [],
    );
  });
});
