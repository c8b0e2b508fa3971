import { expect, test } from "vitest";
import { highlights } from "../../server/editor/highlight.ts";
import { references } from "../../server/editor/references.ts";
import { mentionsOf } from "../../server/editor/things.ts";
import { cursorIn, marked } from "./fixture.ts";
import { allShown, inOneGo, shown } from "./spans.ts";

function mentioned(text: string, withDeclarations = true) {
  const { farm, cursor } = cursorIn(text);
  return allShown(farm, inOneGo(references(farm, cursor, withDeclarations)));
}

function lit(text: string) {
  const { farm, cursor } = cursorIn(text);
  return inOneGo(highlights(farm, cursor)).map(
    ({ span, declares }) => `${declares ? "write" : "read"} ${shown(farm, span)}`,
  );
}

const farm = (header: string) => `
use "vat.marl"

log vat
  2026-11-01 08:00 set soda 40 mL/day, lime-pump 30 mL/day
  2026-11-02 gave soda 10 mL by soda
  2026-11-03 topped 2 L with soda
  2026-11-04 gave soda 5 mL and then some # soda
  2026-11-05 note "soda is low"
// file: stock.marl
solution ${header}
  dissolve sodium-carbonate 80 g
  make up to 1 L

store
  2026-11-01 mixed soda 1 L
// file: vat.marl
use "stock.marl"

system vat
  tank soda 500 L
  pump soda-pump gives soda at 40 mL/min
  pump lime-pump gives soda at 40 mL/min
  top-off soda 20 L
// file: z-other.marl
solution soda
  supplies alkalinity 1 meq/mL
`;

test("all that speaks of a solution, and nothing that only looks like it", () => {
  const uses = [
    "farm.marl:4 2026-11-01 08:00 set [soda] 40 mL/day, lime-pump 30 mL/day",
    "farm.marl:5 2026-11-02 gave [soda] 10 mL by soda",
    "farm.marl:6 2026-11-03 topped 2 L with [soda]",
    "farm.marl:7 2026-11-04 gave [soda] 5 mL and then some # soda",
  ];
  const rest = [
    "stock.marl:6 2026-11-01 mixed [soda] 1 L",
    "vat.marl:5 pump soda-pump gives [soda] at 40 mL/min",
    "vat.marl:6 pump lime-pump gives [soda] at 40 mL/min",
    "vat.marl:7 top-off [soda] 20 L",
  ];
  expect(mentioned(farm("so|da"))).toEqual([...uses, "stock.marl:1 solution [soda]", ...rest]);
  expect(mentioned(farm("so|da"), false)).toEqual([...uses, ...rest]);
});

test("own names are those of one system, also where logs stand in other files", () => {
  const text = `
use "vats.marl"

log north
  2026-11-01 set head-1 40 mL/day

log south
  2026-11-01 set he|ad-1 40 mL/day
  2026-11-02 stopped head-1
// file: vats.marl
solution soda
  supplies alkalinity 1.6 meq/mL

system north
  tank main 500 L
  pump head-1 gives soda at 40 mL/min

system south
  tank main 500 L
  pump head-1 gives soda at 40 mL/min
`;
  expect(mentioned(text)).toEqual([
    "farm.marl:7 2026-11-01 set [head-1] 40 mL/day",
    "farm.marl:8 2026-11-02 stopped [head-1]",
    "vats.marl:10 pump [head-1] gives soda at 40 mL/min",
  ]);
});

test("a pump whose own line is at fault is still known by its name", () => {
  const text = `
system vat
  tank main 500 L
  pump he|ad-1 gives nobody at 40 mL/min

log vat
  2026-11-01 stopped head-1
`;
  expect(mentioned(text)).toEqual([
    "farm.marl:3 pump [head-1] gives nobody at 40 mL/min",
    "farm.marl:6 2026-11-01 stopped [head-1]",
  ]);
});

test("recipes that a third file joins to those of two others are one thing", () => {
  const text = `
use "a.marl"
use "b.marl"

system vat
  tank main 500 L
  by-hand so|da
// file: a.marl
solution soda
  supplies alkalinity 1.6 meq/mL
// file: b.marl
solution soda from 2026-10-01
  supplies alkalinity 1.5 meq/mL

store
  2026-10-02 mixed soda 1 L
`;
  const all = [
    "a.marl:1 solution [soda]",
    "b.marl:1 solution [soda] from 2026-10-01",
    "b.marl:5 2026-10-02 mixed [soda] 1 L",
    "farm.marl:6 by-hand [soda]",
  ];
  expect(mentioned(text)).toEqual(all);
});

test("a name that nobody declares has no references", () => {
  expect(mentioned("system vat\n  tank main 500 L\n  by-hand so|da\n")).toBeNull();
});

test("built-in reagents are mentioned too", () => {
  expect(
    mentioned("solution a\n  dissolve sodium|-carbonate 8 g\n\nreagent drum\n  is sodium-carbonate\n"),
  ).toEqual(["farm.marl:2 dissolve [sodium-carbonate] 8 g", "farm.marl:5 is [sodium-carbonate]"]);
});

test("highlights stay in the file, and tell what declares", () => {
  expect(
    lit(
      'system v|at\n  tank main 500 L\n\nlog vat\n  2026-11-01 read pH 8\n// file: b.marl\nuse "farm.marl"\nlog vat\n',
    ),
  ).toEqual(["write farm.marl:1 system [vat]", "read farm.marl:4 log [vat]"]);
});

test("a parameter lights up wherever the file speaks of it", () => {
  const text = `
system vat
  tank main 500 L
  hold magnesium 1280 to 1350 mg/L
  limit magnesium rise 40 mg/L/day
  skeleton magnesium 4 %

log vat
  2026-11-01 read calcium 420 mg/L, magn|esium 1300 mg/L # magnesium
  2026-11-02 read magnesium 1300 mgg/L
`;
  expect(lit(text)).toEqual([
    "read farm.marl:3 hold [magnesium] 1280 to 1350 mg/L",
    "read farm.marl:4 limit [magnesium] rise 40 mg/L/day",
    "read farm.marl:8 2026-11-01 read calcium 420 mg/L, [magnesium] 1300 mg/L # magnesium",
    "read farm.marl:9 2026-11-02 read [magnesium] 1300 mgg/L",
  ]);
});

test("mentions in 20 000 lines are found in a moment", () => {
  const line = (index: number) =>
    `  2026-${String((index % 11) + 1).padStart(2, "0")}-${String((index % 28) + 1).padStart(2, "0")} read pH 8.${index % 10} with bench`;
  const lines = Array.from({ length: 20_000 }, (_, index) => line(index));
  const { farm } = marked(
    `kit bench\n  pH scatter 0.05\n\nsystem vat\n  tank main 500 L\n\nlog vat\n${lines.join("\n")}\n`,
  );
  const thing = { kind: "kit", name: "bench", key: "kit bench", ref: "bench", builtIn: false } as const;
  // Time of the processor, which other work on the machine doesn't count in.
  const times = [1, 2, 3, 4, 5].map(() => {
    const began = process.cpuUsage();
    expect(mentionsOf(farm, thing)).toHaveLength(20_001);
    const { user, system } = process.cpuUsage(began);
    return (user + system) / 1000;
  });
  expect(Math.min(...times)).toBeLessThan(150);
}, 60_000);
