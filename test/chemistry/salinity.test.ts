import fc from "fast-check";
import { describe, expect, test } from "vitest";
import {
  conductivityFromSalinity,
  practicalSalinityAtIpts68,
  type SpecificGravityScale,
  salinityFromConductivity,
  salinityFromSpecificGravity,
  specificGravity,
  specificGravityScales,
  standardConductivityMsPerCm,
} from "../../server/chemistry/salinity.ts";
import { answer, within } from "./reference.ts";

describe("specific gravity", () => {
  // An outside table computed from EOS-80: salinity, 25/25, 20/20, 15/15 °C.
  const table = [
    [30, 1.02259, 1.02279, 1.02304],
    [33, 1.02486, 1.02508, 1.02535],
    [34, 1.02561, 1.02584, 1.02612],
    [35, 1.02637, 1.0266, 1.0269],
    [36, 1.02713, 1.02737, 1.02767],
    [38, 1.02865, 1.0289, 1.02921],
  ] as const;

  test.each(table)("salinity %d", (salinity, at25, at20, at15) => {
    within(specificGravity(salinity, 25, 25), at25, 0.6e-5, "25/25");
    within(specificGravity(salinity, 20, 20), at20, 0.6e-5, "20/20");
    within(specificGravity(salinity, 15, 15), at15, 0.6e-5, "15/15");
    // 1e-5 of specific gravity is 0.013 of salinity.
    within(answer(salinityFromSpecificGravity(at25, "25/25 °C")).salinity, salinity, 0.007, "from 25/25");
    within(answer(salinityFromSpecificGravity(at20, "20/20 °C")).salinity, salinity, 0.007, "from 20/20");
  });

  test("against other references, 1.026 is not 35", () => {
    within(specificGravity(35, 25, 4), 1.02337, 0.6e-5, "25/4");
    within(specificGravity(35, 25, specificGravityScales["60/60 °F"]), 1.02435, 0.6e-5, "25/15.56");
    within(specificGravity(35, 20, 4), 1.02479, 0.6e-5, "20/4");
  });

  test("and back, on every scale", () => {
    const scales = Object.keys(specificGravityScales) as SpecificGravityScale[];
    fc.assert(
      fc.property(
        fc.constantFrom(...scales),
        fc.double({ min: 0, max: 60, noNaN: true }),
        (scale, salinity) => {
          const celsius = specificGravityScales[scale];
          const found = salinityFromSpecificGravity(specificGravity(salinity, celsius, celsius), scale);
          within(answer(found).salinity, salinity, 1e-9, scale);
        },
      ),
    );
  });

  test("what no sea water has is told", () => {
    const reason = (gravity: number) => salinityFromSpecificGravity(gravity, "25/25 °C");
    expect(reason(0.999)).toEqual({ ok: false, reason: "below-fresh-water" });
    expect(reason(35)).toEqual({ ok: false, reason: "beyond-any-sea-water" });
    expect(reason(Number.NaN)).toEqual({ ok: false, reason: "not-a-number" });
    expect(reason(1)).toMatchObject({ ok: true });
  });
});

describe("conductivity (PSS-78, no pressure)", () => {
  test("ratio 1 at 15 °C is 35 (UNESCO 1983, from memory)", () => {
    expect(practicalSalinityAtIpts68(1, 15).toFixed(6)).toBe("35.000000");
  });

  test("the standard at 25 °C on either temperature scale", () => {
    within(practicalSalinityAtIpts68(53.0648 / standardConductivityMsPerCm, 25), 35, 0.00005, "t68");
    expect(conductivityFromSalinity(35, 25)?.toFixed(4)).toBe("53.0710");
  });

  // From GSW-C, whose practical salinity is PSS-78 (t90).
  test.each([
    [30, "46.2532"],
    [33, "50.3632"],
    [34, "51.7202"],
    [36, "54.4156"],
    [38, "57.0866"],
  ])("salinity %d at 25 °C conducts %s mS/cm", (salinity, printed) => {
    expect(conductivityFromSalinity(salinity, 25)?.toFixed(4)).toBe(printed);
  });

  test("50.00 mS/cm at 25 °C is 32.7332 (GSW-C)", () => {
    expect(answer(salinityFromConductivity(50, 25)).salinity.toFixed(4)).toBe("32.7332");
  });

  test("and back", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 60, noNaN: true }),
        fc.double({ min: -2, max: 45, noNaN: true }),
        (salinity, celsius) => {
          const conductivity = conductivityFromSalinity(salinity, celsius)!;
          within(
            answer(salinityFromConductivity(conductivity, celsius)).salinity,
            salinity,
            1e-9,
            "salinity",
          );
        },
      ),
    );
  });

  test("nothing that is written breaks it", () => {
    for (const value of [0, -1, 1e9, Number.NaN, Number.POSITIVE_INFINITY]) {
      const found = salinityFromConductivity(value, 25);
      // The scale begins at 2: pure water reads a hundredth.
      if (found.ok) within(found.salinity, 0, 0.02, "pure water");
      else expect(found.reason).toMatch(/number|fresh|beyond/);
    }
    expect(conductivityFromSalinity(-1, 25)).toBeUndefined();
    expect(conductivityFromSalinity(Number.NaN, 25)).toBeUndefined();
  });
});
