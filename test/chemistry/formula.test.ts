import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { molarMass, molarMassText, parseFormula } from "../../server/chemistry/formula.ts";
import { answer } from "./reference.ts";

const massOf = (text: string) => molarMassText(answer(parseFormula(text)).elements);
const counts = (text: string) => Object.fromEntries(answer(parseFormula(text)).elements);

describe("molar mass", () => {
  // Sums of the abridged weights of IUPAC/CIAAW 2024, to the last digit.
  test.each(
    Object.entries({
      NaHCO3: "84.006",
      Na2CO3: "105.988",
      Na2CO3·H2O: "124.003",
      Na2CO3·10H2O: "286.138",
      NaOH: "39.997",
      "Ca(OH)2": "74.092",
      CaO: "56.077",
      CaCO3: "100.086",
      CaCl2: "110.978",
      CaCl2·2H2O: "147.008",
      CaCl2·6H2O: "219.068",
      NaCl: "58.44",
      MgCl2: "95.205",
      MgCl2·6H2O: "203.295",
      MgSO4: "120.361",
      MgSO4·7H2O: "246.466",
      KCl: "74.548",
      SrCl2: "158.52",
      SrCl2·6H2O: "266.61",
      H2O: "18.015",
      "Mg(OH)2": "58.319",
      HCO3: "61.016",
      CO3: "60.008",
      SO4: "96.056",
      H3BO3: "61.831",
      Na2SO4: "142.036",
      KHCO3: "100.114",
      K2CO3: "138.204",
    }),
  )("%s is %s g/mol", (formula, mass) => {
    expect(massOf(formula)).toBe(mass);
  });

  // Encyclopaedia figures with other roundings of the weights.
  test.each([
    ["CaCl2", 110.98],
    ["MgCl2", 95.211],
    ["MgSO4·7H2O", 246.47],
    ["Ca(OH)2", 74.093],
    ["NaHCO3", 84.007],
    ["NaOH", 39.9971],
  ])("%s agrees with an outside %d", (formula, mass) => {
    expect(Math.abs(molarMass(answer(parseFormula(formula)).elements) - mass)).toBeLessThan(0.007);
  });

  test("has no trailing point or lost zero", () => {
    expect(massOf("C100")).toBe("1201.1");
    expect(massOf("S50")).toBe("1603");
    expect(massOf("Ca500")).toBe("20039");
  });
});

describe("reading a formula", () => {
  test("the hydrate dot in any of its spellings", () => {
    const hexahydrate = { Sr: 1, Cl: 2, H: 12, O: 6 };
    for (const dot of ["·", ".", "*", "•"]) expect(counts(`SrCl2${dot}6H2O`)).toEqual(hexahydrate);
    expect(counts("MgCl2.6H2O")).toEqual({ Mg: 1, Cl: 2, H: 12, O: 6 });
  });

  test("brackets, nested, and coefficients, decimal too", () => {
    expect(counts("Ca(OH)2")).toEqual({ Ca: 1, O: 2, H: 2 });
    expect(counts("[Mg(OH)2]3")).toEqual({ Mg: 3, O: 6, H: 6 });
    expect(counts("2NaHCO3")).toEqual({ Na: 2, H: 2, C: 2, O: 6 });
    expect(counts("2Mg(OH)2·MgCl2·4H2O")).toEqual({ Mg: 3, O: 8, H: 12, Cl: 2 });
    expect(counts("CaSO4·0.5H2O")).toEqual({ Ca: 1, S: 1, O: 4.5, H: 1 });
    expect(counts("CaSO4.0.5H2O")).toEqual({ Ca: 1, S: 1, O: 4.5, H: 1 });
  });

  test.each([
    ["", 0, "empty"],
    ["NaXO3", 2, "unknown-element"],
    ["naCl", 0, "unexpected-character"],
    ["Ca(OH2", 2, "unclosed-bracket"],
    ["CaOH)2", 4, "unopened-bracket"],
    ["Ca(OH]2", 5, "unexpected-character"],
    ["Ca()2", 2, "empty"],
    ["SrCl2·", 6, "empty"],
    ["Na0", 2, "nothing-to-count"],
    ["Na1000", 2, "number-too-large"],
    ["Na Cl", 2, "unexpected-character"],
    ["((((((((((H))))))))))", 8, "too-long"],
    ["H".repeat(81), 80, "too-long"],
    ["((H999)999)999", 0, "number-too-large"],
  ])("%s fails at %d: %s", (text, at, reason) => {
    expect(parseFormula(text)).toEqual({ ok: false, at, reason });
  });

  test("never throws, and weighs whatever it reads", () => {
    const letters = fc.constantFrom(..."NaClCaOHSrMg()[]·.*0129 x😀");
    fc.assert(
      fc.property(fc.array(letters, { maxLength: 30 }), (characters) => {
        const formula = parseFormula(characters.join(""));
        if (formula.ok) expect(molarMass(formula.elements)).toBeGreaterThan(0);
        else expect(formula.at).toBeLessThanOrEqual(characters.join("").length);
      }),
    );
  });
});
