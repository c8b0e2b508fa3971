/** The carbonate system of readings: which belong together, and with which water they are solved. */
import { describe, expect, it } from "vitest";
import { writeMoment } from "../../grammar/dates.ts";
import { system } from "./fixture.ts";

const text = (log: string, facts = "") => `system vat
  tank main 1000 L
${facts}

log vat
${log}
`;

/** Readings with their carbonate system: the time, and pH on the total scale. */
const solved = (log: string, moment = "2026-11-20") =>
  system(text(log), moment).readings.flatMap(({ event, carbonate }) =>
    carbonate ? [`${writeMoment(event.minute).slice(11)} pH ${carbonate.state.pHTotal.toFixed(4)}`] : [],
  );

const assumed = (log: string) => system(text(log), "2026-11-20").assumptions.map(({ what }) => what);

/** 2300 µmol/kg at 35 and 25 °C, 1.0233412 kg/L, in meq/L. */
const standard = "alkalinity 2300 umol/kg, salinity 35, temperature 25 degC";

describe("alkalinity and pH of one water", () => {
  it("on one line", () => {
    // CALC with the constants of Dickson, Sabine & Christian 2007: TA 2300, DIC 2000 µmol/kg, S 35, 25 °C has
    // pH 8.0458 (total), CO2 11.237, HCO3 1775.38, CO3 213.379 µmol/kg, fCO2 395.77 µatm, Ω 3.3857 (aragonite)
    // and 5.1365 (calcite) with 10.28457 mmol/kg of calcium.
    const [reading] = system(
      text(`  2026-11-01 08:00 read ${standard}, pH 8.0458 total, calcium 10.28457 mmol/kg`),
      "2026-11-20",
    ).readings;
    const { state, densityKgPerL } = reading!.carbonate!;
    expect(densityKgPerL).toBeCloseTo(1.0233412, 6);
    expect(state.dicUmolPerKg).toBeCloseTo(2000, 0);
    expect(state.bicarbonateUmolPerKg).toBeCloseTo(1775.38, 0);
    expect(state.carbonateUmolPerKg).toBeCloseTo(213.379, 1);
    expect(state.co2UmolPerKg).toBeCloseTo(11.237, 2);
    expect(state.omegaAragonite).toBeCloseTo(3.3857, 2);
    expect(state.omegaCalcite).toBeCloseTo(5.1365, 2);
    // pCO2 is the fugacity over 0.9968 at 25 °C.
    expect(state.pCO2Uatm).toBeCloseTo(395.77 / 0.9968, 0);
  });

  it("on two lines within the hour, in the later of them", () => {
    expect(solved("  2026-11-01 08:00 read alkalinity 8 dKH\n  2026-11-01 09:00 read pH 8 total")).toEqual([
      "09:00 pH 8.0000",
    ]);
    expect(solved("  2026-11-01 08:00 read pH 8 total\n  2026-11-01 09:00 read alkalinity 8 dKH")).toEqual([
      "09:00 pH 8.0000",
    ]);
    expect(solved("  2026-11-01 08:00 read alkalinity 8 dKH\n  2026-11-01 08:00 read pH 8 total")).toEqual([
      "08:00 pH 8.0000",
    ]);
  });

  it("not beyond the hour", () => {
    expect(solved("  2026-11-01 08:00 read alkalinity 8 dKH\n  2026-11-01 09:01 read pH 8 total")).toEqual(
      [],
    );
  });

  it("the nearest before, of several", () => {
    const log = `  2026-11-01 08:00 read pH 7.9 total
  2026-11-01 08:30 read pH 8 total
  2026-11-01 08:40 read alkalinity 8 dKH
  2026-11-01 08:50 read calcium 420 mg/L
  2026-11-01 09:30 read pH 8.1 total`;
    expect(solved(log)).toEqual(["08:40 pH 8.0000", "09:30 pH 8.1000"]);
  });

  it("not what is disregarded, impossible or below a value", () => {
    const alkalinity = "  2026-11-01 08:00 read alkalinity 8 dKH\n";
    expect(solved(`${alkalinity}  2026-11-01 08:10 read pH 8 total disregard "dry probe"`)).toEqual([]);
    expect(solved(`${alkalinity}  2026-11-01 08:10 read pH below 8`)).toEqual([]);
    expect(
      solved(
        `${alkalinity}  2026-11-01 08:10 read pH 8.3 total disregard "dry probe"\n  2026-11-01 08:20 read pH 8 total`,
      ),
    ).toEqual(["08:20 pH 8.0000"]);
  });

  it("not what is later than the moment asked", () => {
    const log = "  2026-11-01 08:00 read alkalinity 8 dKH\n  2026-11-01 08:30 read pH 8 total";
    expect(solved(log, "2026-11-01 08:29")).toEqual([]);
    expect(system(text(log), "2026-11-01 08:29").readings).toHaveLength(1);
    expect(solved(log, "2026-11-01 08:30")).toEqual(["08:30 pH 8.0000"]);
  });
});

describe("scale", () => {
  it("is NBS unless `total` is written, and that is told", () => {
    // NBS less total is +0.134 at 35 and 25 °C: Takahashi et al. 1982 with the constants above.
    const [line] = solved(`  2026-11-01 08:00 read ${standard}, pH 8.18`);
    expect(Number(line?.slice(-6))).toBeCloseTo(8.18 - 0.134, 2);
    expect(assumed(`  2026-11-01 08:00 read ${standard}, pH 8.18`)).toContain("pH scale");
    expect(assumed(`  2026-11-01 08:00 read ${standard}, pH 8.05 total`)).not.toContain("pH scale");
  });
});

describe("salinity, temperature and calcium", () => {
  const omega = (log: string) =>
    system(text(log), "2026-11-30").readings.findLast(({ carbonate }) => carbonate)?.carbonate?.state
      .omegaAragonite ?? Number.NaN;
  const at = (line: string, more = "") =>
    omega(`${more}  2026-11-10 08:00 read alkalinity 2.4 meq/L, pH 8 total${line}`);
  const earlier = (day: string, value: string) => `  2026-11-${day} read ${value}\n`;

  it("are of the line itself", () => {
    const other = earlier("10 07:00", "calcium 300 mg/L, salinity 30, temperature 20 degC");
    const own = ", calcium 420 mg/L, salinity 35, temperature 25 degC";
    expect(at(own, other)).toBeCloseTo(at(own), 12);
  });

  it("else the nearest within a day, before or after", () => {
    const water = ", salinity 35, temperature 25 degC";
    const with420 = at(`${water}, calcium 420 mg/L`);
    expect(at(water, earlier("09 08:00", "calcium 420 mg/L"))).toBeCloseTo(with420, 12);
    const later = (moment: string) =>
      omega(
        `  2026-11-10 08:00 read alkalinity 2.4 meq/L, pH 8 total${water}\n  2026-11-${moment} read calcium 420 mg/L`,
      );
    expect(later("11 08:00")).toBeCloseTo(with420, 12);
    expect(later("11 08:01")).not.toBeCloseTo(with420, 3);
    const both = `${earlier("09 09:00", "calcium 300 mg/L")}  2026-11-10 08:00 read alkalinity 2.4 meq/L, pH 8 total${water}\n  2026-11-10 20:00 read calcium 420 mg/L`;
    expect(omega(both)).toBeCloseTo(with420, 12);
  });

  it("else the latest before, however old", () => {
    const water = ", salinity 35, temperature 25 degC";
    const old = earlier("01 08:00", "calcium 300 mg/L") + earlier("05 08:00", "calcium 420 mg/L");
    expect(at(water, old)).toBeCloseTo(at(`${water}, calcium 420 mg/L`), 12);
  });

  it("else the default, which is told", () => {
    const log = "  2026-11-10 08:00 read alkalinity 2.4 meq/L, pH 8 total";
    // Reference sea water of 35 holds 412.1 mg/kg of calcium, 421.7 mg/L (Millero et al. 2008).
    expect(omega(log)).toBeCloseTo(at(", salinity 35, temperature 25 degC, calcium 421.7 mg/L"), 3);
    expect(assumed(log)).toEqual(expect.arrayContaining(["salinity", "temperature", "calcium, for Ω"]));
    const whole =
      "  2026-11-10 08:00 read alkalinity 2.4 meq/L, pH 8 total, calcium 420 mg/L, salinity 35, temperature 25 degC";
    expect(assumed(whole)).not.toEqual(expect.arrayContaining(["calcium, for Ω"]));
    expect(assumed(whole)).not.toContain("salinity");
  });

  it("are never of a disregarded line", () => {
    const dry = '  2026-11-10 07:00 read salinity 20 disregard "dry probe"\n';
    expect(at("", dry)).toBeCloseTo(at(""), 12);
  });
});
