import { describe, expect, test } from "vitest";
import {
  celsiusIpts68,
  densityKgPerL,
  densityKgPerM3AtIpts68,
  referenceCompositionMmolPerKg as sea,
  seaWaterComposition,
} from "../../server/chemistry/sea-water.ts";

describe("density (EOS-80, one atmosphere)", () => {
  // Fofonoff & Millard 1983, UNESCO Tech. Pap. Mar. Sci. 44, p. 19; temperature on IPTS-68.
  test.each([
    [0, 5, "999.96675"],
    [0, 25, "997.04796"],
    [35, 5, "1027.67547"],
    [35, 25, "1023.34306"],
  ])("salinity %d at %d °C is %s kg/m³", (salinity, celsius, printed) => {
    expect(densityKgPerM3AtIpts68(salinity, celsius).toFixed(5)).toBe(printed);
  });

  test("takes the temperature of today's scale", () => {
    expect(celsiusIpts68(25)).toBe(25.006);
    expect((1000 * densityKgPerL(35, 25)).toFixed(4)).toBe("1023.3412");
  });

  // Computed from EOS-80 in an outside table, t90.
  test.each([
    [30, 1019.568],
    [33, 1021.831],
    [34, 1022.586],
    [36, 1024.097],
    [38, 1025.611],
  ])("salinity %d at 25 °C is %d kg/m³", (salinity, density) => {
    expect(1000 * densityKgPerL(salinity, 25)).toBeCloseTo(density, 3);
  });
});

test("density is that of water over all that can be asked about", () => {
  for (let salinity = 0; salinity <= 60; salinity += 5) {
    for (let celsius = -2; celsius <= 45; celsius += 1) {
      const density = densityKgPerL(salinity, celsius);
      expect(density > 0.98 && density < 1.06, `${salinity}, ${celsius}`).toBe(true);
    }
  }
});

describe("reference composition (Millero et al. 2008)", () => {
  test("its charges balance, which is its alkalinity", () => {
    const positive = sea.sodium + sea.potassium + 2 * (sea.magnesium + sea.calcium + sea.strontium);
    const strongAcids = sea.chloride + 2 * sea.sulfate + sea.bromide + sea.fluoride;
    expect(1000 * (positive - strongAcids)).toBeCloseTo(seaWaterComposition(35).alkalinityUmolPerKg, 0);
  });

  test("mg/kg at 35 as printed", () => {
    const water = seaWaterComposition(35);
    expect(water.calciumMgPerKg).toBeCloseTo(412.1, 1);
    expect(water.magnesiumMgPerKg).toBeCloseTo(1283.7, 1);
    expect(water.potassiumMgPerKg).toBeCloseTo(399.1, 1);
    expect(water.strontiumMgPerKg).toBeCloseTo(7.95, 2);
    expect(water.boronMgPerKg).toBeCloseTo(4.49, 2);
    // Printed with the weights of 2005, which differ in the fifth figure.
    expect(water.sodiumMgPerKg / 10781.5).toBeCloseTo(1, 4);
    expect(water.chlorideMgPerKg / 19352.7).toBeCloseTo(1, 3);
    expect(water.sulfateMgPerKg / 2712.3).toBeCloseTo(1, 3);
    expect(water.alkalinityUmolPerKg).toBeCloseTo(2304, 0);
  });

  test("goes with salinity", () => {
    expect(seaWaterComposition(30).calciumMgPerKg).toBeCloseTo(
      (seaWaterComposition(35).calciumMgPerKg * 30) / 35,
      9,
    );
    expect(seaWaterComposition(0).magnesiumMgPerKg).toBe(0);
  });
});
