/** Values of parameters: every unit in every place that allows it, and what is wrong elsewhere. */
import { describe, expect, it } from "vitest";
import { amount, carbonDioxide } from "./fixture.ts";

describe("alkalinity in the water", () => {
  it.each([
    ["2.8 meq/L", "2.8 meq per litre"],
    ["2.8 mmol/L", "2.8 meq per litre"],
    ["2800 umol/L", "2.8 meq per litre"],
    ["2300 umol/kg", "2.3 meq per kilogram"],
    ["2300 µmol/kg", "2.3 meq per kilogram"],
    ["2.3 mmol/kg", "2.3 meq per kilogram"],
    ["140 mg/L as CaCO3", "140 mg as CaCO3 per litre"],
    ["0.14 g/L as CaCO3", "140 mg as CaCO3 per litre"],
    ["140 ppm as CaCO3", "140 mg as CaCO3 per litre"],
  ])("%s", (text, expected) => {
    expect(amount(text, "alkalinity")).toBe(expected);
  });

  it("is 2.80385 dKH to a meq/L", () => {
    // 1 dKH is 10 mg/L of CaO; M(CaO) = 40.078 + 15.999 = 56.077 (IUPAC abridged weights): 2 × 10 / 56.077 meq/L,
    // and 56.077 / 20 = 2.80385 exactly.
    expect(Number.parseFloat(amount("1 dKH", "alkalinity"))).toBeCloseTo(20 / 56.077, 14);
    expect(amount("2.80385 dKH", "alkalinity")).toBe("1 meq per litre");
  });

  it.each([
    ["140 mg/L", 'unit/as-caco3 "mg/L"'],
    ["140 ppm", 'unit/as-caco3 "ppm"'],
    ["140 mg/kg", 'unit/as-caco3 "mg/kg"'],
    ["2.8 meq", 'unit/dimension "meq" for alkalinity: dKH, meq/L'],
    ["2.8 meq/L as CaCO3", 'unit/dimension "meq/L" for alkalinity: dKH, meq/L'],
    ["8", 'unit/missing "8" for alkalinity: dKH, meq/L'],
    ["8 degC", 'unit/dimension "degC" for alkalinity: dKH, meq/L'],
    ["8 %", 'unit/dimension "%" for alkalinity: dKH, meq/L'],
    ["8 mL/L", 'unit/dimension "mL/L" for alkalinity: dKH, meq/L'],
    ["8 dKH/day", 'unit/dimension "dKH/day" for alkalinity: dKH, meq/L'],
    ["8 dKh", 'unit/unknown "dKh" → dKH'],
  ])("%s is wrong", (text, expected) => {
    expect(amount(text, "alkalinity")).toBe(expected);
  });
});

describe("a dissolved element in the water", () => {
  it.each([
    ["420 mg/L", "420 mg per litre"],
    ["0.42 g/L", "420 mg per litre"],
    ["410 mg/kg", "410 mg per kilogram"],
    ["0.41 g/kg", "410 mg per kilogram"],
    ["10.5 mmol/L", "10.5 mmol per litre"],
    ["10.3 mmol/kg", "10.3 mmol per kilogram"],
    ["10500 umol/L", "10.5 mmol per litre"],
    ["10300 umol/kg", "10.3 mmol per kilogram"],
    ["1050 mg/L as CaCO3", "1050 mg as CaCO3 per litre"],
    ["1050 ppm as CaCO3", "1050 mg as CaCO3 per litre"],
    ["420 ppm", '420 mg per litre (unit/ppm "ppm")'],
  ])("calcium %s", (text, expected) => {
    expect(amount(text, "calcium")).toBe(expected);
  });

  it("as CaCO3 is for calcium and magnesium", () => {
    expect(amount("5300 mg/L as CaCO3", "magnesium")).toBe("5300 mg as CaCO3 per litre");
    expect(amount("400 mg/L as CaCO3", "potassium")).toBe('unit/as-caco3 "as CaCO3"');
    expect(amount("8 mg/L as CaCO3", "strontium")).toBe('unit/as-caco3 "as CaCO3"');
    expect(amount("5 mg/L as CaCO3", "nitrate")).toBe('unit/as-caco3 "as CaCO3"');
    expect(amount("10 mmol/L as CaCO3", "calcium")).toBe('unit/as-caco3 "as CaCO3"');
  });

  it.each([
    ["420", 'unit/missing "420" for calcium: mg/L, mmol/L'],
    ["8 dKH", 'unit/dimension "dKH" for calcium: mg/L, mmol/L'],
    ["21 meq/L", 'unit/dimension "meq/L" for calcium: mg/L, mmol/L'],
    ["420 mg", 'unit/dimension "mg" for calcium: mg/L, mmol/L'],
    ["420 mL/L", 'unit/dimension "mL/L" for calcium: mg/L, mmol/L'],
    ["420 day/day", 'unit/dimension "day/day" for calcium: mg/L, mmol/L'],
    ["420 mmol/mmol", 'unit/dimension "mmol/mmol" for calcium: mg/L, mmol/L'],
    ["420 mg/l", 'unit/unknown "mg/l" → L'],
  ])("calcium %s is wrong", (text, expected) => {
    expect(amount(text, "calcium")).toBe(expected);
  });
});

describe("salinity, temperature, pH, CO2", () => {
  it.each([
    ["35", "salinity", "35 PSS-78"],
    ["35 ppt", "salinity", "35 PSS-78"],
    ["1.0264 SG", "salinity", "1.0264 specific gravity 25/25 °C"],
    ["1.0266 SG20", "salinity", "1.0266 specific gravity 20/20 °C"],
    ["1.0269 SG60F", "salinity", "1.0269 specific gravity 60/60 °F"],
    ["53.07 mS/cm", "salinity", "53.07 conductivity"],
    ["25.5 degC", "temperature", "25.5 °C"],
    ["25.5 °C", "temperature", "25.5 °C"],
    // (77 − 32) × 5/9 = 25.
    ["77 degF", "temperature", "25 °C"],
    ["77 °F", "temperature", "25 °C"],
    ["-40 degF", "temperature", "-40 °C"],
    ["8.1", "pH", "8.1 NBS"],
    ["8.1 total", "pH", "8.1 total"],
  ] as const)("%s of %s", (text, name, expected) => {
    expect(amount(text, name)).toBe(expected);
  });

  it.each([
    ["35 mg/L", "salinity", 'unit/dimension "mg/L" for salinity: no unit, ppt'],
    ["35 mL/L", "salinity", 'unit/dimension "mL/L" for salinity: no unit, ppt'],
    ["35 g/kg", "salinity", 'unit/dimension "g/kg" for salinity: no unit, ppt'],
    ["25", "temperature", 'unit/missing "25" for temperature: degC, degF'],
    ["25 ppt", "temperature", 'unit/dimension "ppt" for temperature: degC, degF'],
    ["8.1 mL/L", "pH", 'unit/dimension "mL/L" for pH: no unit, total'],
    ["8.1 dKH", "pH", 'unit/dimension "dKH" for pH: no unit, total'],
    ["8.1 as CaCO3", "pH", 'unit/missing "8.1" for pH: no unit, total'],
  ] as const)("%s of %s is wrong", (text, name, expected) => {
    expect(amount(text, name)).toBe(expected);
  });

  it("CO2 is a share of dry air or a partial pressure", () => {
    expect(carbonDioxide("520 ppm")).toBe("520 ppm");
    expect(carbonDioxide("520 uatm")).toBe("520 uatm");
    expect(carbonDioxide("520 µatm")).toBe("520 uatm");
    expect(carbonDioxide("520")).toBe('unit/missing "520" for CO2: ppm, uatm');
    expect(carbonDioxide("520 mg/L")).toBe('unit/dimension "mg/L" for CO2: ppm, uatm');
    expect(carbonDioxide("520 ppm as CaCO3")).toBe('unit/dimension "ppm" for CO2: ppm, uatm');
  });
});

describe("differences", () => {
  it("has no zero point: 2 degF is 1.11 K", () => {
    expect(amount("2 degF", "temperature", "difference")).toBe("1.1111111111111111111 °C");
    expect(amount("77 degF ± 1.8 degF", "temperature")).toBe("25 °C ± 1 °C");
    expect(amount("25 degC ± 1.8 degF", "temperature")).toBe("25 °C ± 1 °C");
    expect(amount("77 degF ± 0.5 degC", "temperature")).toBe("25 °C ± 0.5 °C");
  });

  it("stands in its own unit, in the number's, or as a share of it", () => {
    expect(amount("2.8 meq/L ± 0.1 mmol/L", "alkalinity")).toBe("2.8 meq per litre ± 0.1 meq per litre");
    expect(amount("2.8 meq/L ± 0.1", "alkalinity")).toBe("2.8 meq per litre ± 0.1 meq per litre");
    expect(amount("420 mg/L ± 2 %", "calcium")).toBe("420 mg per litre ± 8.4 mg per litre");
    expect(amount("420 mg/L ± 0.1 mmol/L", "calcium")).toBe("420 mg per litre ± 0.1 mmol per litre");
    expect(amount("8.1 ± 0.05", "pH")).toBe("8.1 NBS ± 0.05 NBS");
    expect(amount("35 ± 0.3", "salinity")).toBe("35 PSS-78 ± 0.3 PSS-78");
  });

  it("a share of a temperature is one of its degrees Celsius", () => {
    expect(amount("77 degF ± 2 %", "temperature")).toBe("25 °C ± 0.5 °C");
  });

  it("of another dimension is wrong", () => {
    expect(amount("420 mg/L ± 5 degC", "calcium")).toContain("unit/dimension");
    expect(amount("8.1 ± 0.1 dKH", "pH")).toContain("unit/dimension");
  });
});

describe("rates", () => {
  it.each([
    ["0.7 meq/L/day", "alkalinity", "0.7 meq per litre"],
    ["4.9 meq/L/week", "alkalinity", "0.7 meq per litre"],
    ["0.1 meq/L/h", "alkalinity", "2.4 meq per litre"],
    ["0.01 meq/L/min", "alkalinity", "14.4 meq per litre"],
    ["0.001 meq/L/s", "alkalinity", "86.4 meq per litre"],
    ["50 mg/L/day as CaCO3", "alkalinity", "50 mg as CaCO3 per litre"],
    ["25 mg/L/day", "calcium", "25 mg per litre"],
    ["25 mg/kg/day", "calcium", "25 mg per kilogram"],
    ["25 ppm/day", "calcium", '25 mg per litre (unit/ppm "ppm/day")'],
    ["0.5", "salinity", "0.5 PSS-78"],
    ["0.5 /day", "salinity", "0.5 PSS-78"],
    ["0.5 ppt/day", "salinity", "0.5 PSS-78"],
    ["3.5 ppt/week", "salinity", "0.5 PSS-78"],
    ["0.1 /day", "pH", "0.1 NBS"],
    ["1.8 degF/day", "temperature", "1 °C"],
    ["0.5 degC/h", "temperature", "12 °C"],
  ] as const)("%s of %s", (text, name, expected) => {
    expect(amount(text, name, "rate")).toBe(expected);
  });

  it.each([
    ["0.7 dKH", "alkalinity", 'unit/dimension "dKH" for alkalinity over time: dKH/day, meq/L/day'],
    ["0.7", "alkalinity", 'unit/missing "0.7" for alkalinity over time: dKH/day, meq/L/day'],
    ["0.7 /day", "alkalinity", 'unit/dimension "/day" for alkalinity over time: dKH/day, meq/L/day'],
    ["1.5 degC", "temperature", 'unit/dimension "degC" for temperature over time: degC/day, degF/day'],
  ] as const)("%s of %s is wrong", (text, name, expected) => {
    expect(amount(text, name, "rate")).toBe(expected);
  });
});

describe("strength of a solution", () => {
  it.each([
    ["1.6 meq/mL", "alkalinity", "1600 meq per litre"],
    ["1.6 mmol/mL", "alkalinity", "1600 meq per litre"],
    ["1.6 mol/L", "alkalinity", "1600 meq per litre"],
    ["80 mg/mL as CaCO3", "alkalinity", "80000 mg as CaCO3 per litre"],
    ["80 g/L as CaCO3", "alkalinity", "80000 mg as CaCO3 per litre"],
    ["72 mg/mL", "calcium", "72000 mg per litre"],
    ["72 g/L", "calcium", "72000 mg per litre"],
    ["1.8 mmol/mL", "calcium", "1800 mmol per litre"],
    ["1.8 mol/L", "calcium", "1800 mmol per litre"],
  ] as const)("%s of %s", (text, name, expected) => {
    expect(amount(text, name, "strength")).toBe(expected);
  });

  it.each([
    ["80 g/L", "alkalinity", 'unit/as-caco3 "g/L"'],
    ["72 mg/kg", "calcium", 'unit/dimension "mg/kg" for a strength: mg/mL, mmol/mL'],
    ["72 g", "calcium", 'unit/dimension "g" for a strength: mg/mL, mmol/mL'],
    ["72", "calcium", 'unit/missing "72" for a strength: mg/mL, mmol/mL'],
  ] as const)("%s of %s is wrong", (text, name, expected) => {
    expect(amount(text, name, "strength")).toBe(expected);
  });
});

describe("uptake", () => {
  it.each([
    ["2.80385 dKH/day", "alkalinity", "1 meq per litre"],
    ["0.3 meq/L/day", "alkalinity", "0.3 meq per litre"],
    ["500 meq/day", "alkalinity", "500 meq in all"],
    ["25 g/day as CaCO3", "alkalinity", "25000 mg as CaCO3 in all"],
    ["250 mmol/day as CaCO3", "alkalinity", "250 mmol as CaCO3 in all"],
    ["0.25 mol/day as CaCO3", "alkalinity", "250 mmol as CaCO3 in all"],
    ["300 umol/kg/day", "alkalinity", "0.3 meq per kilogram"],
    ["6 mg/L/day", "calcium", "6 mg per litre"],
    ["10 g/day", "calcium", "10000 mg in all"],
    ["250 mmol/day", "calcium", "250 mmol in all"],
    ["70 g/week", "calcium", "10000 mg in all"],
  ] as const)("of a system: %s of %s", (text, name, expected) => {
    expect(amount(text, name, "uptake")).toBe(expected);
  });

  it.each([
    ["0.9 meq/day", "0.9 meq in all"],
    // m² is 100 dm², the base unit of areas here: 240 mmol/m² is 2.4 mmol/dm².
    ["240 mmol/m2/day as CaCO3", "2.4 mmol as CaCO3 per area"],
    ["480 meq/m2/day", "4.8 meq per area"],
    ["24 umol/cm2/day as CaCO3", "2.4 mmol as CaCO3 per area"],
    ["24 g/m2/day as CaCO3", "240 mg as CaCO3 per area"],
    ["1 g/day as CaCO3", "1000 mg as CaCO3 in all"],
    ["10 mmol/day as CaCO3", "10 mmol as CaCO3 in all"],
  ])("of a cohort: %s", (text, expected) => {
    expect(amount(text, "alkalinity", "cohort uptake")).toBe(expected);
  });

  it.each([
    ["500 mmol/day", "uptake", 'unit/as-caco3 "mmol/day"'],
    ["25 g/day", "uptake", 'unit/as-caco3 "g/day"'],
    ["500 meq", "uptake", 'unit/dimension "meq" for an uptake: dKH/day, meq/day'],
    ["240 mmol/m2/day", "cohort uptake", 'unit/as-caco3 "mmol/m2/day"'],
    ["5 g/m2/day", "cohort uptake", 'unit/as-caco3 "g/m2/day"'],
    [
      "0.3 meq/L/day",
      "cohort uptake",
      'unit/dimension "meq/L/day" for an uptake: meq/day, mmol/day as CaCO3',
    ],
    ["500 meq/day as CaCO3", "uptake", 'unit/dimension "meq/day" for an uptake: dKH/day, meq/day'],
  ] as const)("%s of a %s is wrong", (text, use, expected) => {
    expect(amount(text, "alkalinity", use)).toBe(expected);
  });

  it("of calcium isn't one as CaCO3 in moles", () => {
    expect(amount("250 mmol/day as CaCO3", "calcium", "uptake")).toBe('unit/as-caco3 "as CaCO3"');
    expect(amount("25 g/day as CaCO3", "calcium", "uptake")).toBe("25000 mg as CaCO3 in all");
  });
});
