/** Readings in the model's units, and those that no sea water, or hardly any, gives. */
import { describe, expect, it } from "vitest";
import type { ParameterName } from "../../grammar/parameters.ts";
import type { ReadEvent } from "../../server/culture/model.ts";
import { at, farm, strength, systemIn } from "./fixture.ts";

const inLog = (lines: string) => `system vat\n  tank main 500 L\n\nlog vat\n${lines}\n`;

const reads = (lines: string): ReadEvent[] =>
  systemIn(farm(inLog(lines))).events.filter((event): event is ReadEvent => event.kind === "read");

/** The value of the last reading that holds a parameter. */
function read(lines: string, parameter: ParameterName): number {
  const found = reads(lines).findLast(({ values }) => values[parameter]);
  return found?.values[parameter]?.value ?? Number.NaN;
}

const one = (text: string, parameter: ParameterName): number =>
  read(`  2026-11-01 08:00 read ${parameter} ${text}`, parameter);

describe("one unit a parameter", () => {
  it.each([
    ["8 dKH", "alkalinity", (8 * 20) / 56.077],
    ["2.85 meq/L", "alkalinity", 2.85],
    ["2.85 mmol/L", "alkalinity", 2.85],
    // Two equivalents a mole, M(CaCO3) = 100.086.
    ["142.6 mg/L as CaCO3", "alkalinity", (2 * 142.6) / 100.086],
    ["142.6 ppm as CaCO3", "alkalinity", (2 * 142.6) / 100.086],
    ["420 mg/L", "calcium", 420],
    ["10.5 mmol/L", "calcium", 10.5 * 40.078],
    ["10500 umol/L", "calcium", 10.5 * 40.078],
    ["1050 mg/L as CaCO3", "calcium", (1050 * 40.078) / 100.086],
    ["5400 mg/L as CaCO3", "magnesium", (5400 * 24.305) / 100.086],
    ["54 mmol/L", "magnesium", 54 * 24.305],
    ["10.2 mmol/L", "potassium", 10.2 * 39.098],
    ["90 umol/L", "strontium", 0.09 * 87.62],
    // NO3 62.004, PO4 94.970 g/mol.
    ["161 umol/L", "nitrate", 0.161 * (14.007 + 3 * 15.999)],
    ["1 umol/L", "phosphate", 0.001 * (30.974 + 4 * 15.999)],
    ["77 degF", "temperature", 25],
    ["8.1 total", "pH", 8.1],
  ] as const)("%s of %s", (text, parameter, expected) => {
    expect(one(text, parameter)).toBeCloseTo(expected, 10);
  });

  it("ppm is read as mg/L, with a note", () => {
    farm(`
system vat
  tank main 500 L

log vat
  2026-11-01 08:00 read calcium 420 ppm, magnesium 1300 ppm
                                    ^^^ unit/ppm, number 420
                                                        ^^^ unit/ppm, number 1300
`);
  });

  it.each([
    // Salinity 35 by EOS-80, fresh and sea water at one temperature: SG 25/25 1.02637, 20/20 1.02660; 15.56/15.56
    // lies between 1.02690 at 15 °C and 1.02660 at 20 °C. A unit of salinity is 0.00076.
    ["1.02637 SG", 35, 0.01],
    ["1.02660 SG20", 35, 0.01],
    ["1.02687 SG60F", 35, 0.04],
    ["1.02259 SG", 30, 0.01],
    // PSS-78, conductivity at 25 °C (ITS-90): 53.0710 mS/cm is 35, 50.00 is 32.7332.
    ["53.0710 mS/cm", 35, 0.0005],
    ["50 mS/cm", 32.7332, 0.0005],
    ["35 ppt", 35, 0],
  ])("salinity %s", (text, expected, within) => {
    expect(Math.abs(one(text, "salinity") - expected)).toBeLessThanOrEqual(within);
  });
});

describe("what is written for a kilogram", () => {
  // UNESCO 1983, t68 ≈ t90: sea water 1023.343 kg/m³ at (35, 25 °C), 1027.675 at (35, 5 °C); 1019.568 at (30, 25 °C).
  it.each([
    ["salinity 35, temperature 25 degC", 1.02334],
    ["salinity 35, temperature 5 degC", 1.02767],
    ["salinity 30, temperature 25 degC", 1.01957],
  ])("takes the density of its own line: %s", (water, density) => {
    const line = `  2026-11-01 08:00 read alkalinity 2300 umol/kg, calcium 410 mg/kg, magnesium 53 mmol/kg, ${water}`;
    // 5 °C is no usual water: it is asked about, and counts.
    const asked = water.includes(" 5 degC")
      ? `\n${" ".repeat(line.indexOf("temperature"))}${"^".repeat("temperature 5 degC".length)} reading/unusual, parameter temperature, value 5`
      : "";
    expect(read(line + asked, "alkalinity")).toBeCloseTo(2.3 * density, 4);
    expect(read(line + asked, "calcium")).toBeCloseTo(410 * density, 1);
    expect(read(line + asked, "magnesium")).toBeCloseTo(53 * 24.305 * density, 1);
  });

  it("takes the nearest salinity within a day, else the latest before, else 35 and 25 °C", () => {
    const alkalinity = (lines: string) =>
      read(`${lines}\n  2026-11-10 08:00 read alkalinity 2300 umol/kg`, "alkalinity");
    const with30 = 2.3 * 1.019568;
    const with35 = 2.3 * 1.023341;
    const later = (line: string) =>
      read(`  2026-11-10 08:00 read alkalinity 2300 umol/kg\n${line}`, "alkalinity");
    expect(alkalinity("")).toBeCloseTo(with35, 4);
    expect(alkalinity("  2026-11-01 08:00 read salinity 30")).toBeCloseTo(with30, 4);
    expect(later("  2026-11-11 08:00 read salinity 30")).toBeCloseTo(with30, 4);
    expect(later("  2026-11-11 08:01 read salinity 30")).toBeCloseTo(with35, 4);
    expect(
      alkalinity("  2026-11-09 07:00 read salinity 35\n  2026-11-10 06:00 read salinity 30"),
    ).toBeCloseTo(with30, 4);
  });

  it("goes back through the same density, whatever the water", () => {
    const inLitres = read(
      "  2026-11-01 08:00 read calcium 400 mg/kg, salinity 33, temperature 22 degC",
      "calcium",
    );
    // 1000 kg/m³ and 33 salinity at 22 °C lie between 1021.8 (25 °C) and 1024.8 + (20 °C).
    expect(inLitres / 400).toBeGreaterThan(1.0218);
    expect(inLitres / 400).toBeLessThan(1.0236);
  });

  it("isn't turned with what no sea water has", () => {
    const bound = farm(`
system vat
  tank main 500 L

log vat
  2026-11-01 08:00 read alkalinity 2300 umol/kg, salinity 350
                                                 ^^^^^^^^^^^^ reading/impossible, parameter salinity, value 350, tenth 35
`);
    const event = systemIn(bound).events[0] as ReadEvent;
    expect(event.values.alkalinity?.value).toBeCloseTo(2.3 * 1.023341, 4);
  });
});

describe("a slip", () => {
  it("of the point is asked about; what sea water can't have is left out", () => {
    const bound = farm(`
system vat
  tank main 500 L

log vat
  2026-11-01 08:00 read alkalinity 79 dKH
                        ^^^^^^^^^^^^^^^^^ reading/impossible, parameter alkalinity, value 28.176, tenth 7.9
  2026-11-02 08:00 read alkalinity 16 dKH
                        ^^^^^^^^^^^^^^^^^ reading/unusual, parameter alkalinity, value 5.7064
  2026-11-03 08:00 read calcium 1001 mg/L
                        ^^^^^^^^^^^^^^^^^ reading/impossible, parameter calcium, value 1001
  2026-11-04 08:00 read calcium 4200 mg/L
                        ^^^^^^^^^^^^^^^^^ reading/impossible, parameter calcium, value 4200, tenth 420
  2026-11-05 08:00 read calcium -5 mg/L
                        ^^^^^^^^^^^^^^^ reading/impossible, parameter calcium, value -5
  2026-11-06 08:00 read salinity 1.3 SG
                        ^^^^^^^^^^^^^^^ reading/impossible, parameter salinity
  2026-11-07 08:00 read salinity 350
                        ^^^^^^^^^^^^ reading/impossible, parameter salinity, value 350, tenth 35
  2026-11-08 08:00 read temperature 254 degC
                        ^^^^^^^^^^^^^^^^^^^^ reading/impossible, parameter temperature, value 254, tenth 25.4
  2026-11-09 08:00 read temperature 780 degF
                        ^^^^^^^^^^^^^^^^^^^^ reading/impossible, parameter temperature, value 415.56, tenth 78
  2026-11-10 08:00 read pH 81
                        ^^^^^ reading/impossible, parameter pH, value 81, tenth 8.1
  2026-11-11 08:00 read pH 7.2
                        ^^^^^^ reading/unusual, parameter pH, value 7.2
  2026-11-12 08:00 read magnesium 3001 mg/L, potassium 1501 mg/L, strontium 101 mg/L
                        ^^^^^^^^^^^^^^^^^^^ reading/impossible, parameter magnesium, value 3001
                                             ^^^^^^^^^^^^^^^^^^^ reading/impossible, parameter potassium, value 1501
                                                                  ^^^^^^^^^^^^^^^^^^ reading/impossible, parameter strontium, value 101, tenth 10.1
  2026-11-13 08:00 read nitrate 5 mg/L, phosphate 0.05 mg/L, alkalinity 7.9 dKH, calcium 420 mg/L
`);
    const [first, second] = systemIn(bound).events as ReadEvent[];
    expect(first!.values.alkalinity).toMatchObject({ impossible: true });
    expect(second!.values.alkalinity).toMatchObject({ impossible: false });
  });

  it("the edges of what can be are themselves possible", () => {
    expect(
      one(
        "45 degC\n                        ^^^^^^^^^^^^^^^^^^^ reading/unusual, parameter temperature, value 45",
        "temperature",
      ),
    ).toBe(45);
    expect(
      one(
        "0 mg/L\n                        ^^^^^^^^^^^^^^ reading/unusual, parameter calcium, value 0",
        "calcium",
      ),
    ).toBe(0);
  });

  it("a disregarded line keeps its values and isn't asked about", () => {
    const bound = farm(`
system vat
  tank main 500 L

log vat
  2026-11-01 08:00 read alkalinity 16 dKH disregard "reagent out of date"
                                                    ^^^^^^^^^^^^^^^^^^^^^ reading/disregarded, reason reagent out of date
`);
    const event = systemIn(bound).events[0] as ReadEvent;
    expect(event.disregarded).toBe(true);
    expect(event.values.alkalinity?.value).toBeCloseTo((16 * 20) / 56.077, 12);
  });

  it("below a value isn't the value", () => {
    const [event] = reads("  2026-11-01 08:00 read nitrate below 2 mg/L, phosphate 0.03 mg/L");
    expect(event!.values.nitrate).toMatchObject({ value: 2, below: true });
    expect(event!.values.phosphate).toMatchObject({ value: 0.03, below: false });
  });

  it("a parameter twice in one line", () => {
    farm(`
system vat
  tank main 500 L

log vat
  2026-11-01 08:00 read alkalinity 8 dKH, alkalinity 8.2 dKH
                                          ^^^^^^^^^^^^^^^^^^ name/twice, word alkalinity, what reading
`);
  });
});

describe("salt waters and kits", () => {
  it("a salt water has what is stated, and from its day on what was read of it", () => {
    const bound = farm(`
saltwater mix
  alkalinity 2300 umol/kg
  salinity 30
  calcium 400 mg/L
  2026-11-10 08:00 read calcium 430 mg/L, salinity 34.6
  2026-11-12 08:00 read calcium 500 mg/L disregard "wrong vial"
`);
    const mix = bound.model.waters.get("mix")!;
    expect(at(mix.values.get("salinity"), "2026-11-01")).toBe(30);
    expect(at(mix.values.get("salinity"), "2026-11-10 08:00")).toBe(34.6);
    expect(at(mix.values.get("calcium"), "2026-11-10 07:59")).toBe(400);
    expect(at(mix.values.get("calcium"), "2026-11-20")).toBe(430);
    // Turned with its own salinity: 1.01957 kg/L at 30 and 25 °C.
    expect(at(mix.values.get("alkalinity"), "2026-11-01")).toBeCloseTo(2.3 * 1.01957, 4);
  });

  it("no salt water has what sea water can't", () => {
    const bound = farm(`
saltwater mix
  alkalinity 79 dKH
  ^^^^^^^^^^^^^^^^^ reading/impossible, parameter alkalinity, value 28.176, tenth 7.9
  salinity 350
  ^^^^^^^^^^^^ reading/impossible, parameter salinity, value 350, tenth 35
`);
    expect(bound.model.waters.get("mix")?.values.size).toBe(0);
  });

  it("a kit's scatter is one standard deviation, its tolerance two", () => {
    const bound = farm(`
kit bench
  alkalinity scatter 0.1 meq/L
  calcium scatter 8 mg/L
  pH tolerance 0.06
  nitrate scatter 15 %
  temperature tolerance 0.9 degF
  salinity scatter 0.00076 SG
  alkalinity scatter 0.2 meq/L
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^ name/twice, word alkalinity, what fact
  2026-11-02 checked alkalinity 8.2 dKH against 8.0 dKH
  2026-11-02 checked alkalinity 8.2 against 8.0 dKH
                                ^^^ unit/missing, number 8.2
`);
    const kit = bound.model.kits.get("bench")!;
    const of = (name: ParameterName) => at(kit.deviations.get(name), "2026-12-01");
    expect(of("alkalinity")).toEqual({ value: 0.1, relative: false });
    expect(of("calcium")).toEqual({ value: 8, relative: false });
    expect(of("pH")).toEqual({ value: 0.03, relative: false });
    expect(of("nitrate")).toEqual({ value: 0.15, relative: true });
    // 0.9 degF are 0.5 K, two standard deviations.
    expect(of("temperature")?.value).toBeCloseTo(0.25, 12);
    // A unit of salinity is 0.00076 of specific gravity near 35 (EOS-80: 1.02713 − 1.02561 from 34 to 36).
    expect(of("salinity")?.value).toBeCloseTo(1, 2);
  });
});

describe("a recipe with a line that can't be read", () => {
  it("has no strength: it would pass for weaker than it is", () => {
    const bound = farm(`
solution one
  dissolve soda-sack 420 g
           ^^^^^^^^^ name/undeclared, word soda-sack, wanted reagent
  dissolve sodium-bicarbonate 10 g
  make up to 1 L

solution two
  dissolve sodium-carbonate 420 g
  dissolve sodium-bicarbonate 10 mL
                                 ^^ unit/dimension
  make up to 1 L

solution three
  dissolve sodium-carbonate 42 g
  make up to 1 L
`);
    expect(bound.model.solutions.get("one")?.strengths).toEqual([]);
    expect(bound.model.solutions.get("one")?.assumptions).toEqual([
      { what: "strength of one", value: "unknown", basis: "a line of its recipe can't be read" },
    ]);
    expect(bound.model.solutions.get("two")?.strengths).toEqual([]);
    expect(strength(bound, "three").alkalinityMeq).toBeCloseTo((2 * 42) / 105.988, 10);
  });
});
