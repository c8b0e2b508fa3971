/** Events of logs: order, lines alike, names, several logs, corals that move. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bindFarm } from "../../server/culture/farm-model.ts";
import { documentsOf, farm, systemIn } from "./fixture.ts";

const vat = `system vat
  tank main 500 L
  cohort plugs 100 pieces uptake 1 meq/day each
  cohort crust 0.4 m2 uptake 200 meq/m2/day
  pump one gives ash at 40 mL/min
  by-hand lime

solution ash
  dissolve sodium-carbonate 80 g
  make up to 1 L

solution lime
  saturated calcium-hydroxide
  keep at 20 degC

saltwater mix
  salinity 35
`;

describe("order", () => {
  it("of one minute is by kind, then by tidy text", () => {
    const bound = farm(`${vat}
log vat
  2026-11-01 08:00 note "Done."
  2026-11-01 08:00 set one 20 mL/day
  2026-11-01 08:00 gave lime 20 mL
  2026-11-01 08:00 gave ash 20 mL
  2026-11-01 08:00 topped 5 L
  2026-11-01 08:00 renewed 50 L with mix
  2026-11-01 08:00 started one
  2026-11-01 08:00 stopped one
  2026-11-01 08:00 moved plugs 5 pieces to west
  2026-11-01 08:00 removed plugs 5 pieces
  2026-11-01 08:00 stocked plugs 5 pieces
  2026-11-01 08:00 level one 2 L
  2026-11-01 08:00 filled one to 5 L
  2026-11-01 08:00 calibrated one 40 mL in 1 min
  2026-11-01 08:00 read pH 8.1
  2026-11-01 08:00 read alkalinity 8 dKH
  2026-11-01 07:59 note "First."
  ^^^^^^^^^^^^^^^^ log/out-of-order

system west
  tank main 500 L
  cohort plugs 10 pieces uptake 1 meq/day each
`);
    const kinds = systemIn(bound, "vat").events.map(({ kind }) => kind);
    expect(kinds).toEqual([
      "note",
      "read",
      "read",
      "calibrated",
      "filled",
      "level",
      "stocked",
      "removed",
      "moved",
      "stopped",
      "started",
      "renewed",
      "topped",
      "gave",
      "gave",
      "set",
      "note",
    ]);
    const texts = systemIn(bound, "vat").events.map(({ text }) => text);
    expect(texts.indexOf("2026-11-01 08:00 read alkalinity 8 dKH")).toBe(1);
    expect(texts.indexOf("2026-11-01 08:00 gave ash 20 mL")).toBeLessThan(
      texts.indexOf("2026-11-01 08:00 gave lime 20 mL"),
    );
  });

  it("a bare date is noon", () => {
    const bound = farm(`${vat}
log vat
  2026-11-01 11:59 gave ash 1 mL
  2026-11-01 gave ash 2 mL
  2026-11-01 12:01 gave ash 3 mL
`);
    const [first, second, third] = systemIn(bound).events;
    expect(second!.minute - first!.minute).toBe(1);
    expect(third!.minute - second!.minute).toBe(1);
    expect([first!.timeKnown, second!.timeKnown]).toEqual([true, false]);
  });

  it("in the files doesn't change the model", () => {
    const lines = [
      "  2026-11-01 08:00 read alkalinity 8 dKH, salinity 35",
      "  2026-11-01 08:00 read calcium 10 mmol/kg",
      "  2026-11-01 09:00 gave ash 20 mL, lime 10 mL",
      "  2026-11-01 09:00 gave ash 20 mL",
      "  2026-11-02 stocked plugs 5 pieces",
      "  2026-11-02 08:00 set one 100 mL/day",
      "  2026-11-03 08:00 renewed 50 L with mix",
      '  2026-11-03 08:00 read salinity 33 disregard "dirty probe"',
    ];
    const facts = vat.split("\n\n")[0]!.split("\n");
    const modelOf = (log: readonly string[], own: readonly string[]) => {
      const text = [...own, "", ...vat.split("\n\n").slice(1), "log vat", ...log].join("\n");
      const { systems } = bindFarm(documentsOf(`${text}\n`), new Map()).model;
      const withoutPlaces = (_: string, value: unknown) =>
        value instanceof Map ? [...value].sort(([left], [right]) => (left < right ? -1 : 1)) : value;
      return JSON.stringify([...systems], withoutPlaces).replace(/"(line|start|end)":\d+/g, "");
    };
    const first = modelOf(lines, facts);
    fc.assert(
      fc.property(
        fc.shuffledSubarray(lines, { minLength: lines.length }),
        fc.shuffledSubarray(facts.slice(1), { minLength: facts.length - 1 }),
        (log, own) => {
          expect(modelOf(log, [facts[0]!, ...own])).toBe(first);
        },
      ),
      { numRuns: 40 },
    );
  });
});

describe("lines alike", () => {
  it("are one event, wherever the second stands; spacing and spelling don't count", () => {
    const bound = farm(`
--- a.marl
${vat}
log vat
  2026-11-01 08:00 gave ash 20 mL
  2026-11-01 08:00  gave  ash 20 mL   # again
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ log/twice
  2026-11-01 08:00 gave ash 20.0 mL
  2026-11-01 08:01 gave ash 20 mL
  2026-11-02 note "Heater."
  2026-11-02 note "Heater."
  ^^^^^^^^^^^^^^^^^^^^^^^^^ log/twice
--- b.marl
use "a.marl"
log vat
  2026-11-01 08:00 gave ash 20 mL
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ log/twice
  2026-11-01 08:00 gave ash 20 mL by mk
`);
    const given = systemIn(bound).events.filter(({ kind }) => kind === "gave");
    expect(given.map(({ text }) => text)).toEqual([
      "2026-11-01 08:00 gave ash 20 mL",
      "2026-11-01 08:00 gave ash 20 mL by mk",
      "2026-11-01 08:00 gave ash 20.0 mL",
      "2026-11-01 08:01 gave ash 20 mL",
    ]);
  });
});

describe("several logs", () => {
  it("of a system add up, from every file that sees it", () => {
    const bound = farm(`
--- a.marl
${vat}
log vat
  2026-11-02 gave ash 2 mL

log vat
  2026-11-01 gave ash 1 mL
--- logs/b.marl
use "../a.marl"
log vat
  2026-11-03 gave ash 3 mL
--- logs/c.marl
log vat
    ^^^ name/undeclared, word vat, wanted system, elsewhere a.marl
  2026-11-04 gave ash 4 mL
`);
    expect(systemIn(bound).events.map(({ text }) => text)).toEqual([
      "2026-11-01 gave ash 1 mL",
      "2026-11-02 gave ash 2 mL",
      "2026-11-03 gave ash 3 mL",
    ]);
    expect(systemIn(bound).logFiles).toEqual(["a.marl", "logs/b.marl"]);
  });
});

describe("names in a log", () => {
  it("are those of its system", () => {
    farm(`${vat}
log vat
  2026-11-01 set two 20 mL/day
                 ^^^ name/undeclared, word two, wanted pump
  2026-11-01 set one 20 mL/day
  2026-11-01 set ash 21 mL/day
  2026-11-01 set lime 22 mL/day
  2026-11-01 set mix 22 mL/day
                 ^^^ name/undeclared, word mix, wanted pump
  2026-11-01 gave mix 22 mL
                  ^^^ name/undeclared, word mix, wanted solution, standsFor saltwater
  2026-11-01 stopped lime
                     ^^^^ name/undeclared, word lime, wanted pump
  2026-11-01 stocked plogs 5 pieces
                     ^^^^^ name/undeclared, word plogs, wanted cohort, nearest plugs
  2026-11-01 renewed 5 L with ash
                              ^^^ name/undeclared, word ash, wanted saltwater system, standsFor solution
  2026-11-01 read pH 8.1 with mix
                              ^^^ name/undeclared, word mix, wanted kit, standsFor saltwater
  2026-11-01 calibrated one 40 mL in 0 min
                                     ^ syntax/number-form, word 0
  2026-11-01 stocked crust 5 pieces
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ log/no-effect, why cohort crust is counted in an area
`);
  });

  it("a solution's name stands for the source that gives it at the time", () => {
    const bound = farm(`
system vat
  tank main 500 L
  pump one gives ash at 40 mL/min
  pump one gives lime at 40 mL/min from 2026-11-10
  pump two gives lime at 40 mL/min until 2026-11-10

solution ash
  dissolve sodium-carbonate 80 g
  make up to 1 L
solution lime
  saturated calcium-hydroxide
  keep at 20 degC

log vat
  2026-11-01 set ash 20 mL/day
  2026-11-02 set lime 21 mL/day
  2026-11-11 set lime 22 mL/day
`);
    const set = systemIn(bound).events.flatMap((event) => (event.kind === "set" ? event.rates : []));
    expect(set.map(({ source }) => source)).toEqual(["one", "two", "one"]);
  });

  it("of a solution with two sources leaves open which", () => {
    farm(`
system vat
  tank main 500 L
  pump one gives ash at 40 mL/min
  by-hand ash

solution ash
  dissolve sodium-carbonate 80 g
  make up to 1 L

log vat
  2026-11-01 set ash 20 mL/day
                 ^^^ name/undeclared, word ash, severalSources one by hand
`);
  });
});

describe("a line with a part that's wrong", () => {
  it("of a standing fact is left out whole", () => {
    const bound = farm(`
system vat
  tank main 500 L
  pump one gives ash at 40 mL/min least 5 g
                                          ^ unit/dimension
  pump two gives ash at 40 mL/min always 5 L
                                           ^ unit/dimension
  by-hand ash always 5 mL
                       ^^ unit/dimension
  cohort plugs 100 pieces uptake 1 meq/day each magnesium 4 g
                                                            ^ unit/dimension
  cohort tips 100 pieces uptake 1 meq/day each grows 200 %/week
                                                     ^^^ syntax/number-form, word 200
  cohort crust 0.4 m2 uptake 1 meq/day each
                               ^^^^^^^ unit/dimension
  cohort rest 5 pieces uptake 1 meq/m2/day
                                ^^^^^^^^^^ unit/dimension

solution ash
  dissolve sodium-carbonate 80 g
  make up to 1 L
`);
    expect(systemIn(bound).facts.sources.size).toBe(0);
    expect(systemIn(bound).facts.cohorts.size).toBe(0);
  });
});

describe("corals that move", () => {
  it("arrive in the cohort of the same name, where it is counted alike", () => {
    const bound = farm(`
system north
  tank main 500 L
  cohort plugs 100 pieces uptake 1 meq/day each
  cohort crust 0.4 m2 uptake 200 meq/m2/day
  cohort tips 10 pieces uptake 1 meq/day each

system south
  tank main 500 L
  cohort plugs 10 pieces uptake 1 meq/day each
  cohort crust 4 pieces uptake 2 meq/day each

log north
  2026-11-01 moved plugs 5 pieces to south
  2026-11-02 moved crust 0.1 m2 to south
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ log/no-effect, why south counts crust in pieces, so what they take there isn't counted
  2026-11-03 moved tips 1 pieces to south
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ log/no-effect, why south has no cohort tips, so what they take there isn't counted
`);
    expect(systemIn(bound, "north").events.map(({ kind }) => kind)).toEqual(["moved", "moved", "moved"]);
    expect(systemIn(bound, "south").events).toMatchObject([{ kind: "stocked", cohort: "plugs", count: 5 }]);
  });
});
