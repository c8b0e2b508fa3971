/** What the file leaves out and a result needs is listed, and nothing that isn't used. */
import { describe, expect, it } from "vitest";
import { found, system } from "./fixture.ts";

const text = (facts: string, log: string) => `
solution lime
  saturated calcium-hydroxide
saltwater mix
  salinity 35
  alkalinity 2.8 meq/L

system vat
  tank main 1000 L
${facts}

log vat
${log}
`;

const listed = (facts: string, log: string, moment = "2026-11-03") =>
  system(text(facts, log), moment).assumptions.map(({ what }) => what);

const read = "  2026-11-01 08:00 read alkalinity 3 meq/L, calcium 420 mg/L";

describe("assumptions", () => {
  it("the water of what is written for a kilogram", () => {
    expect(listed("", "  2026-11-01 08:00 read alkalinity 2900 umol/kg")).toEqual(
      expect.arrayContaining(["salinity", "temperature"]),
    );
    const known = "  2026-11-01 08:00 read alkalinity 2900 umol/kg, salinity 35, temperature 25 degC";
    expect(listed("", known)).not.toContain("salinity");
    expect(listed("", known)).not.toContain("temperature");
    expect(listed("", read)).not.toContain("salinity");
    expect(listed("  hold calcium 10 to 11 mmol/kg", "")).toContain("salinity");
    expect(listed("  hold calcium 10 to 11 mmol/kg\n  hold salinity 34 to 36", "")).not.toContain("salinity");
  });

  it("an uptake that isn't known, where its value is carried on", () => {
    const what = "what the corals take of alkalinity";
    expect(listed("", read)).toContain(what);
    expect(listed("  uptake alkalinity 0.1 meq/L/day", read)).not.toContain(what);
    expect(listed("", "  2026-11-01 08:00 read calcium 420 mg/L")).not.toContain(what);
  });

  it("what a water that came in doesn't state", () => {
    expect(listed("", `${read}\n  2026-11-02 08:00 renewed 100 L with mix`)).toContain("calcium of mix");
    expect(listed("", `${read}\n  2026-11-02 08:00 renewed 100 L with mix`, "2026-11-20")).not.toContain(
      "calcium of mix",
    );
    expect(listed("  flows-through 10 L/day with mix", read)).toContain("calcium of mix");
    // Nobody asks for its magnesium.
    expect(listed("  flows-through 10 L/day with mix", read)).not.toContain("magnesium of mix");
    expect(listed("", read)).not.toContain("calcium of mix");
  });

  it("what a recipe that was given doesn't say", () => {
    const storage = "storage temperature of lime";
    expect(listed("", `${read}\n  2026-11-02 08:00 gave lime 100 mL`)).toContain(storage);
    expect(listed("", `${read}\n  2026-11-02 08:00 topped 1 L with lime`)).toContain(storage);
    expect(listed("  evaporates 10 L/day\n  top-off lime 100 L", read)).toContain(storage);
    expect(listed("  by-hand lime", read)).toContain(storage);
    expect(listed("", read)).not.toContain(storage);
  });

  it("how evaporated water is made up", () => {
    expect(listed("  evaporates 10 L/day", read)).toContain("evaporated water");
    expect(listed("  evaporates 10 L/day\n  top-off 100 L", read)).not.toContain("evaporated water");
    expect(listed("  top-off lime 100 L", read)).toContain("evaporation");
  });
});

describe("bands and limits of what is only tested", () => {
  it("hold for nitrate, phosphate, temperature and pH as for the rest", () => {
    const facts = `  hold nitrate 2 to 10 mg/L
  hold phosphate 0.02 to 0.1 mg/L
  hold temperature 24 to 26 degC
  hold pH 7.9 to 8.4
  limit nitrate max 20 mg/L
  limit temperature max 28 degC`;
    const told = (line: string) =>
      found(
        system(text(facts, `  2026-11-01 08:00 read ${line}`), "2026-11-03"),
        "water/outside",
        "water/beyond",
      );
    expect(told("nitrate 5 mg/L, phosphate 0.05 mg/L, temperature 25 degC, pH 8.1")).toEqual([]);
    expect(told("nitrate 15 mg/L, phosphate 0.2 mg/L, temperature 27 degC, pH 7.8")).toEqual([
      "water/outside-hold: temperature 27 degC",
      "water/outside-hold: nitrate 15 mg/L",
      "water/outside-hold: phosphate 0.2 mg/L",
      "water/outside-hold: pH 7.8",
    ]);
    expect(
      told("nitrate 25 mg/L, temperature 29 degC").filter((one) => one.startsWith("water/beyond")),
    ).toEqual(["water/beyond-limit: temperature 29 degC", "water/beyond-limit: nitrate 25 mg/L"]);
    expect(told("nitrate below 30 mg/L")).toEqual([]);
  });
});
