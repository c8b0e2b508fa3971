import { describe, expect, test } from "vitest";
import {
  type CarbonateState,
  fromAlkalinityAndDic,
  fromAlkalinityAndPco2,
  fromAlkalinityAndPh,
  fromDicAndPh,
  nbsFromTotal,
  totalFromNbs,
} from "../../server/chemistry/carbonate-system.ts";
import { constantsAt, type SeaWaterConstants } from "../../server/chemistry/constants-at.ts";
import { totalBoron } from "../../server/chemistry/equilibrium.ts";
import { answer, near, reference, within } from "./reference.ts";

type Figures = Record<string, number>;
type FromPh = {
  salinity: number;
  temperature_degC: number;
  alkalinity_umol_kg: number;
  pH: number;
  calcium_mmol_kg: number;
  as_total_scale: Figures;
  as_nbs_scale: Figures;
};

/** Reference values are printed to ten figures: these tolerances are a hundred times tighter than theirs. */
const relative = 1e-6;
const ofPh = 1e-6;

describe("the reference library's states", () => {
  const figures: Record<string, (state: CarbonateState) => number> = {
    dic_umol_kg: (state) => state.dicUmolPerKg,
    pCO2_uatm: (state) => state.pCO2Uatm,
    fCO2_uatm: (state) => state.fCO2Uatm,
    carbonate_umol_kg: (state) => state.carbonateUmolPerKg,
    bicarbonate_umol_kg: (state) => state.bicarbonateUmolPerKg,
    co2_umol_kg: (state) => state.co2UmolPerKg,
    omega_aragonite: (state) => state.omegaAragonite,
    omega_calcite: (state) => state.omegaCalcite,
  };
  const { states } = reference<{ states: FromPh[] }>("carbonate-states.json");
  const waterOf = (given: FromPh) => ({
    salinity: given.salinity,
    temperatureDegC: given.temperature_degC,
    calciumUmolPerKg: 1000 * given.calcium_mmol_kg,
  });

  test("from alkalinity and pH on the total scale", () => {
    expect(states.length).toBe(300);
    for (const given of states) {
      const known = { alkalinityUmolPerKg: given.alkalinity_umol_kg, pHTotal: given.pH };
      const state = answer(fromAlkalinityAndPh(known, waterOf(given)));
      for (const [name, figure] of Object.entries(figures)) {
        near(figure(state), given.as_total_scale[name]!, relative, name);
      }
      within(state.pHNbs, given.as_total_scale.pH_nbs!, ofPh, "pH NBS");
      const constants = answer(constantsAt(given.salinity, given.temperature_degC));
      const free = state.pHTotal + Math.log10(constants.totalOverFree);
      within(free, given.as_total_scale.pH_free!, ofPh, "pH free");
      const seawater = state.pHTotal + constants.seawaterScaleLessTotal;
      within(seawater, given.as_total_scale.pH_sws!, ofPh, "pH seawater scale");
    }
  });

  test("from alkalinity and pH on the NBS scale", () => {
    for (const given of states) {
      const constants = answer(constantsAt(given.salinity, given.temperature_degC));
      const pHTotal = totalFromNbs(given.pH, constants);
      expect(nbsFromTotal(pHTotal, constants)).toBeCloseTo(given.pH, 12);
      const known = { alkalinityUmolPerKg: given.alkalinity_umol_kg, pHTotal };
      const state = answer(fromAlkalinityAndPh(known, waterOf(given), constants));
      within(state.pHTotal, given.as_nbs_scale.pH_total!, ofPh, "pH total");
      near(state.dicUmolPerKg, given.as_nbs_scale.dic_umol_kg!, relative, "DIC");
      near(state.pCO2Uatm, given.as_nbs_scale.pCO2_uatm!, relative, "pCO2");
      near(state.omegaAragonite, given.as_nbs_scale.omega_aragonite!, relative, "Ω");
    }
  });

  test("from alkalinity and DIC, and in balance with 420 µatm", () => {
    const dosed = reference<{ states: Figures[] }>("carbonate-from-dic.json").states;
    expect(dosed.length).toBe(300);
    for (const given of dosed) {
      const water = {
        salinity: given.salinity!,
        temperatureDegC: given.temperature_degC!,
        calciumUmolPerKg: 10280,
      };
      const alkalinityUmolPerKg = given.alkalinity_umol_kg!;
      const state = answer(
        fromAlkalinityAndDic({ alkalinityUmolPerKg, dicUmolPerKg: given.dic_umol_kg! }, water),
      );
      within(state.pHTotal, given.pH_total!, ofPh, "pH");
      near(state.pCO2Uatm, given.pCO2_uatm!, relative, "pCO2");
      const balanced = answer(fromAlkalinityAndPco2({ alkalinityUmolPerKg, pCO2Uatm: 420 }, water));
      within(balanced.pHTotal, given.pH_total_at_pCO2_420_uatm!, ofPh, "pH in balance");
      near(balanced.dicUmolPerKg, given.dic_at_pCO2_420_uatm!, relative, "DIC in balance");
    }
  });
});

const naturalCalcium = 10284.57;
const standard = { salinity: 35, temperatureDegC: 25, calciumUmolPerKg: naturalCalcium };

/** With the handbook's KW (Dickson et al. 2007), in which the figures below were computed. */
function handbook(temperatureDegC: number): SeaWaterConstants {
  const constants = answer(constantsAt(35, temperatureDegC));
  const { seawaterScaleLessTotal } = constants;
  return { ...constants, KW: constants.KW * 10 ** -seawaterScaleLessTotal * Math.exp(-0.015) };
}

describe("independent computations from the handbook's formulas (Dickson et al. 2007)", () => {
  test.each([
    [2300, 2000, 25, "8.0458", "11.237", "1775.38", "213.379", "395.77", "3.3857", "5.1365"],
    [2300, 2000, 20, "8.1217", "10.462", "1778.13", "211.408", "322.83", "3.2862", "5.0563"],
    [2300, 2000, 28, "8.0008", "11.768", "1773.81", "214.426", "446.16", "3.4532", "5.1897"],
  ])("alkalinity %d, DIC %d, %d °C", (alkalinityUmolPerKg, dicUmolPerKg, temperatureDegC, ...printed) => {
    const water = { ...standard, temperatureDegC };
    const known = { alkalinityUmolPerKg, dicUmolPerKg };
    const state = answer(fromAlkalinityAndDic(known, water, handbook(temperatureDegC)));
    const [pH, co2, bicarbonate, carbonate, fCO2, aragonite, calcite] = printed;
    const digit = (text: string) => 0.75 * 10 ** -text.split(".")[1]!.length;
    within(state.pHTotal, Number(pH), digit(pH!), "pH");
    within(state.co2UmolPerKg, Number(co2), digit(co2!), "CO2");
    within(state.bicarbonateUmolPerKg, Number(bicarbonate), digit(bicarbonate!), "HCO3");
    within(state.carbonateUmolPerKg, Number(carbonate), 2 * digit(carbonate!), "CO3");
    within(state.fCO2Uatm, Number(fCO2), digit(fCO2!), "fCO2");
    within(state.omegaAragonite, Number(aragonite), digit(aragonite!), "Ω aragonite");
    within(state.omegaCalcite, Number(calcite), digit(calcite!), "Ω calcite");
    // With the exact KW the same water differs by less than any kit can tell.
    const exact = answer(fromAlkalinityAndDic(known, water));
    within(exact.pHTotal, state.pHTotal, 2e-4, "pH by the other KW");
    near(exact.omegaAragonite, state.omegaAragonite, 4e-4, "Ω by the other KW");
  });

  test.each([
    [2300, 2002.21, "8.0421", 211.958, 3.3631, 5.1023],
    [2648.52, 2284.17, "8.0938", 268.956, 4.2675, 6.4744],
  ])(
    "alkalinity %d in balance with fCO2 400 µatm",
    (alkalinityUmolPerKg, dic, pH, carbonate, omega, calcite) => {
      const constants = handbook(25);
      const pCO2Uatm = 400 / constants.fugacityFactor;
      const state = answer(fromAlkalinityAndPco2({ alkalinityUmolPerKg, pCO2Uatm }, standard, constants));
      within(state.dicUmolPerKg, dic, 0.0075, "DIC");
      expect(state.pHTotal.toFixed(4)).toBe(pH);
      within(state.co2UmolPerKg, 11.357, 0.00075, "CO2");
      within(state.carbonateUmolPerKg, carbonate, 0.0015, "CO3");
      within(state.omegaAragonite, omega, 0.75e-4, "Ω aragonite");
      within(state.omegaCalcite, calcite, 0.75e-4, "Ω calcite");
    },
  );

  // Speciation printed in the manual of an open carbonate library: pH 8.1, DIC 2000 µmol/kg, 35, 25 °C.
  test("from DIC and pH", () => {
    const state = answer(fromDicAndPh({ dicUmolPerKg: 2000, pHTotal: 8.1 }, standard));
    near(state.co2UmolPerKg, 9.786181, 1e-6, "CO2");
    near(state.bicarbonateUmolPerKg, 1751.70257, 1e-8, "HCO3");
    near(state.carbonateUmolPerKg, 238.511253, 1e-8, "CO3");
    near(state.fCO2Uatm, 344.682, 2e-6, "fCO2");
    // That library takes a fugacity factor that differs in the fifth figure.
    near(state.pCO2Uatm, 345.789, 2e-5, "pCO2");
    // Its alkalinity rests on 433 µmol/kg boron (Lee et al. 2010) and the handbook's KW: 2340.84 with both.
    const constants = handbook(25);
    const moreBoron = { ...constants, boron: 432.6e-6 };
    expect(totalBoron(35)).toBeCloseTo(415.7e-6, 12);
    const other = answer(fromDicAndPh({ dicUmolPerKg: 2000, pHTotal: 8.1 }, standard, moreBoron));
    within(other.alkalinityUmolPerKg, 2340.84, 0.11, "alkalinity");
  });

  // What alkalinity additions do to water of alkalinity 2300 and DIC 2000 µmol/kg, without gas exchange.
  test.each([
    [146, 5, 8.24],
    [319, 7, 8.42],
    [569, 10, 8.63],
    [757, 12.3, 8.77],
    [2967, 30, 10.2],
  ])("hydroxide +%d µmol/kg: Ω %d, pH %d", (added, omega, pH) => {
    const known = { alkalinityUmolPerKg: 2300 + added, dicUmolPerKg: 2000 };
    const state = answer(fromAlkalinityAndDic(known, standard, handbook(25)));
    near(state.omegaAragonite, omega, 2e-3, "Ω");
    within(state.pHTotal, pH, 0.0051, "pH");
  });

  test.each([
    [2913, 5, 8.13],
    [3577, 7, 8.2],
    [4474, 10, 8.28],
    [5110, 12.3, 8.32],
  ])("alkalinity %d in balance with 400 µatm: Ω %d, pH %d", (alkalinityUmolPerKg, omega, pH) => {
    const constants = handbook(25);
    const pCO2Uatm = 400 / constants.fugacityFactor;
    const state = answer(fromAlkalinityAndPco2({ alkalinityUmolPerKg, pCO2Uatm }, standard, constants));
    near(state.omegaAragonite, omega, 1e-3, "Ω");
    within(state.pHTotal, pH, 0.0051, "pH");
  });

  // One degree of alkalinity at once, closed: carbonate hardness by three routes.
  test.each([
    ["NaHCO3", 1, 7.996, 3.58],
    ["Na2CO3", 0.5, 8.242, 5.46],
    ["NaOH", 0, 8.446, 7.35],
  ])("348.5 µmol/kg as %s", (_salt, carbonPerEquivalent, pH, omega) => {
    const known = {
      alkalinityUmolPerKg: 2300 + 348.52,
      dicUmolPerKg: 2000 + 348.52 * carbonPerEquivalent,
    };
    const state = answer(fromAlkalinityAndDic(known, standard, handbook(25)));
    within(state.pHTotal, pH, 0.0006, "pH");
    within(state.omegaAragonite, omega, 0.006, "Ω");
  });

  // Gattuso & Lavigne 2009, Biogeosciences 6, 4413–4437: carbonate and bicarbonate added to closed sea water.
  test("a manipulation of sea water", () => {
    const water = {
      salinity: 34.3,
      temperatureDegC: 16,
      calciumUmolPerKg: (naturalCalcium * 34.3) / 35,
    };
    const before = answer(fromAlkalinityAndPco2({ alkalinityUmolPerKg: 2302, pCO2Uatm: 384 }, water));
    within(before.pHTotal, 8.064, 0.0005, "pH");
    within(before.dicUmolPerKg, 2071.2, 0.06, "DIC");
    within(before.omegaAragonite, 2.564, 0.0005, "Ω");
    const alkalinityUmolPerKg = before.alkalinityUmolPerKg + 2 * 260 + 1000;
    expect(alkalinityUmolPerKg).toBeCloseTo(3822, 9);
    const dicUmolPerKg = before.dicUmolPerKg + 260 + 1000;
    const after = answer(fromAlkalinityAndDic({ alkalinityUmolPerKg, dicUmolPerKg }, water));
    // More carbonate per carbon than before: pH and Ω rise.
    expect(after.pHTotal).toBeGreaterThan(before.pHTotal);
    expect(after.omegaAragonite).toBeGreaterThan(before.omegaAragonite);
  });

  test("pCO2 rises about 4 % and pH falls about 0.015 for a degree of warming, closed", () => {
    const at = (temperatureDegC: number) =>
      answer(
        fromAlkalinityAndDic(
          { alkalinityUmolPerKg: 2300, dicUmolPerKg: 2000 },
          { ...standard, temperatureDegC },
        ),
      );
    within(Math.log(at(25).fCO2Uatm / at(20).fCO2Uatm) / 5, 0.0407, 5e-5, "per degree");
    within((at(25).pHTotal - at(20).pHTotal) / 5, -0.0152, 5e-5, "pH per degree");
  });
});

// Common practice, no source: facts of the trade.
describe("sea water near pH 8.1", () => {
  const state = answer(fromAlkalinityAndPh({ alkalinityUmolPerKg: 2300, pHTotal: 8.1 }, standard));

  test("holds far more bicarbonate than carbonate, and more carbonate than carbon dioxide", () => {
    expect(state.bicarbonateUmolPerKg).toBeGreaterThan(5 * state.carbonateUmolPerKg);
    expect(state.carbonateUmolPerKg).toBeGreaterThan(10 * state.co2UmolPerKg);
  });

  test("is supersaturated with aragonite; acid takes it below 1, where CaCO3 dissolves", () => {
    expect(state.omegaAragonite).toBeGreaterThan(1);
    const acid = { alkalinityUmolPerKg: 2300 - 1000, dicUmolPerKg: state.dicUmolPerKg };
    expect(answer(fromAlkalinityAndDic(acid, standard)).omegaAragonite).toBeLessThan(1);
  });

  test("calcite is the less soluble of the two", () => {
    expect(state.omegaCalcite).toBeGreaterThan(state.omegaAragonite);
  });
});

// Common practice, no source.
test("carbonic acid gives up its protons in two steps", () => {
  const { K1, K2 } = answer(constantsAt(35, 25));
  const at = (pHTotal: number) => answer(fromDicAndPh({ dicUmolPerKg: 2000, pHTotal }, standard));
  const first = at(-Math.log10(K1));
  near(first.co2UmolPerKg, first.bicarbonateUmolPerKg, 1e-12, "half way through the first step");
  expect(first.carbonateUmolPerKg).toBeLessThan(1);
  const second = at(-Math.log10(K2));
  near(second.bicarbonateUmolPerKg, second.carbonateUmolPerKg, 1e-12, "half way through the second");
  expect(second.co2UmolPerKg).toBeLessThan(1);
  expect(-Math.log10(K2) - -Math.log10(K1)).toBeGreaterThan(3);
});
