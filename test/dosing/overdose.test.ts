/** Doses of the log that broke a limit, and their silent twins. A litre of ash brings 1 meq/L to the 1000 L here. */
import { describe, expect, it } from "vitest";
import { finding, found, system } from "./fixture.ts";

const text = (log: string, facts = "") => `
solution ash
  supplies alkalinity 1 meq/mL as carbonate
solution bicarbonate
  supplies alkalinity 1 meq/mL as bicarbonate
solution caustic
  supplies alkalinity 1 meq/mL as hydroxide
solution chloride
  supplies calcium 40 mg/mL
solution epsom
  supplies magnesium 40 mg/mL

system vat
  tank main 1000 L
  hold alkalinity 2.6 to 3.4 meq/L aim 3
  hold salinity 34 to 36
  uptake alkalinity 0.1 meq/L/day
  pump one gives ash at 40 mL/min
  pump two gives chloride at 40 mL/min
  by-hand epsom
${facts}

log vat
  2026-11-01 08:00 read alkalinity 3 meq/L, calcium 420 mg/L, magnesium 1300 mg/L, salinity 35, pH 8.1, temperature 25 degC
${log}
`;

const overdoses = (log: string, facts = "", moment = "2026-11-20") =>
  found(system(text(log, facts), moment), "overdose/").filter((one) => !/\/(ph|precipitation):/.test(one));

const dKH = 20 / 56.077;

describe("one dose by hand", () => {
  it("raises alkalinity by 0.5 dKH at most where nothing is said", () => {
    // 0.5 dKH in 1000 L are 178.3 meq.
    expect(overdoses("  2026-11-01 09:00 gave ash 178 mL")).toEqual([]);
    expect(overdoses("  2026-11-01 09:00 gave ash 180 mL")).toEqual(["overdose/alkalinity-dose: ash 180 mL"]);
    const told = finding(
      system(text("  2026-11-01 09:00 gave ash 180 mL"), "2026-11-20"),
      "overdose/alkalinity-dose",
    );
    expect(told).toMatchObject({ solution: "ash", limitStated: false });
    expect(told.value).toBeCloseTo(0.18, 12);
    expect(told.limit).toBeCloseTo(0.5 * dKH, 12);
  });

  it("keeps to the limit in force that day, however old the dose is", () => {
    const facts =
      "  limit alkalinity dose 0.1 meq/L until 2026-11-05\n  limit alkalinity dose 0.15 meq/L from 2026-11-05";
    const log = `  2026-11-02 09:00 gave ash 120 mL
  2026-11-06 09:00 gave ash 120 mL
  2026-11-08 09:00 gave ash 160 mL`;
    expect(overdoses(log, facts, "2026-12-20")).toEqual([
      "overdose/alkalinity-dose: ash 120 mL",
      "overdose/alkalinity-dose: ash 160 mL",
    ]);
  });

  it("counts what the top-up brought", () => {
    expect(overdoses("  2026-11-01 09:00 topped 0.18 L with ash")).toEqual([
      "overdose/alkalinity-dose: 2026-11-01 09:00 topped 0.18 L with ash",
    ]);
    expect(overdoses("  2026-11-01 09:00 topped 10 L")).toEqual([]);
  });

  it("of calcium is limited where the file says so", () => {
    expect(overdoses("  2026-11-01 09:00 gave chloride 600 mL")).toEqual([]);
    expect(overdoses("  2026-11-01 09:00 gave chloride 600 mL", "  limit calcium dose 20 mg/L")).toEqual([
      "overdose/calcium-dose: chloride 600 mL",
    ]);
  });

  it("is none later than the moment asked, nor before its moment comes", () => {
    expect(overdoses("  2026-11-01 09:00 gave ash 180 mL", "", "2026-11-01 08:59")).toEqual([]);
  });
});

describe("the doses of a day", () => {
  it("raise the day's mean less what is taken", () => {
    // 0.7 dKH are 0.24964 meq/L: with 0.1 a day taken, 349.6 mL in doses of 175 fit into a day, 360 don't.
    expect(overdoses("  2026-11-01 09:00 gave ash 174 mL\n  2026-11-01 20:00 gave ash 174 mL")).toEqual([]);
    const log = "  2026-11-01 09:00 gave ash 178 mL\n  2026-11-02 08:59 gave ash 178 mL";
    expect(overdoses(log)).toEqual(["overdose/alkalinity-rise: ash 178 mL"]);
    const told = finding(system(text(log), "2026-11-20"), "overdose/alkalinity-rise");
    expect(told.value).toBeCloseTo(0.356 - 0.1, 12);
    expect(told.limit).toBeCloseTo(0.7 * dKH, 12);
  });

  it("a day later count no more", () => {
    expect(overdoses("  2026-11-01 09:00 gave ash 178 mL\n  2026-11-02 09:00 gave ash 178 mL")).toEqual([]);
  });

  it("add to what pumps give", () => {
    const log = (rate: number) =>
      `  2026-11-01 08:30 set one ${rate} mL/day\n  2026-11-01 09:00 gave ash 178 mL`;
    // 0.178 + rate − 0.1 against 0.2496.
    expect(overdoses(log(170))).toEqual([]);
    expect(overdoses(log(180))).toEqual(["overdose/alkalinity-rise: ash 178 mL"]);
  });

  it("on one line add up", () => {
    const facts = "  limit alkalinity rise 0.2 meq/L/day";
    expect(overdoses("  2026-11-01 09:00 gave ash 160 mL, bicarbonate 160 mL", facts)).toEqual([
      "overdose/alkalinity-rise: bicarbonate 160 mL",
    ]);
  });

  it("of calcium: 25 mg/L a day", () => {
    // 2.0 mg/L a day are taken: 0.05 × 0.995 × 40.078.
    expect(overdoses("  2026-11-01 09:00 gave chloride 670 mL")).toEqual([]);
    expect(overdoses("  2026-11-01 09:00 gave chloride 690 mL")).toEqual([
      "overdose/calcium-rise: chloride 690 mL",
    ]);
  });
});

describe("never above", () => {
  it("12 dKH, or what the file says, with the dose in it", () => {
    const facts = "  limit alkalinity max 3.1 meq/L";
    expect(overdoses("  2026-11-01 08:00 gave ash 100 mL", facts)).toEqual([]);
    expect(overdoses("  2026-11-01 08:00 gave ash 102 mL", facts)).toEqual([
      "overdose/alkalinity-max: ash 102 mL",
    ]);
    // Half a day later 0.05 has been taken.
    expect(overdoses("  2026-11-01 20:00 gave ash 150 mL", facts)).toEqual([]);
    expect(overdoses("  2026-11-01 20:00 gave ash 152 mL", facts)).toEqual([
      "overdose/alkalinity-max: ash 152 mL",
    ]);
  });

  it("says nothing of water that wasn't read for a week", () => {
    expect(overdoses("  2026-11-09 09:00 gave ash 150 mL", "  limit alkalinity max 2 meq/L")).toEqual([]);
  });

  it("isn't broken by what doesn't raise it", () => {
    const facts = "  limit alkalinity max 2.9 meq/L\n  limit calcium max 410 mg/L";
    expect(overdoses("  2026-11-01 09:00 gave epsom 100 mL", facts)).toEqual([]);
  });
});

describe("where uptake isn't known", () => {
  const unknown = (log: string) =>
    found(
      system(text(log).replace("  uptake alkalinity 0.1 meq/L/day\n", ""), "2026-11-20"),
      "overdose/",
    ).filter((one) => !/\/(ph|precipitation):/.test(one));

  it("a leap of calcium is still one", () => {
    expect(unknown("  2026-11-01 09:00 gave chloride 600 mL")).toEqual([]);
    expect(unknown("  2026-11-01 09:00 gave chloride 640 mL")).toEqual([
      "overdose/calcium-rise: chloride 640 mL",
    ]);
  });

  it("alkalinity is judged by the single dose alone", () => {
    expect(unknown("  2026-11-01 09:00 gave ash 178 mL\n  2026-11-01 12:00 gave ash 178 mL")).toEqual([]);
    expect(unknown("  2026-11-01 09:00 gave ash 180 mL")).toEqual(["overdose/alkalinity-dose: ash 180 mL"]);
  });
});

describe("what is set", () => {
  it("raises the day's mean by the limit at most", () => {
    // 0.2496 + 0.1 taken: 349.6 mL/day.
    expect(overdoses("  2026-11-01 09:00 set one 345 mL/day")).toEqual([]);
    expect(overdoses("  2026-11-01 09:00 set one 355 mL/day")).toEqual([
      "overdose/alkalinity-rise: one 355 mL/day",
    ]);
    expect(overdoses("  2026-11-01 09:00 set one 355 mL/day, two 10 mL/day")).toEqual([
      "overdose/alkalinity-rise: one 355 mL/day",
    ]);
  });

  it("while its pump stands still is told of when it starts", () => {
    const log = (rate: number) => `  2026-11-01 08:30 stopped one
  2026-11-01 09:00 set one ${rate} mL/day
  2026-11-01 10:00 started one`;
    expect(overdoses(log(355))).toEqual(["overdose/alkalinity-rise: 2026-11-01 10:00 started one"]);
    expect(overdoses(log(345))).toEqual([]);
  });

  it("by another line is that line's", () => {
    const log = "  2026-11-01 09:00 set one 345 mL/day\n  2026-11-02 09:00 set two 100 mL/day";
    expect(overdoses(log)).toEqual([]);
  });
});

describe("pH and precipitation right after", () => {
  const peak = (log: string, facts = "") =>
    found(system(text(log, facts), "2026-11-20"), "overdose/ph", "overdose/precipitation");

  it("hydroxide raises pH more than carbonate, and bicarbonate lowers it", () => {
    const loose = "  limit pH max 9.5\n  limit pH dose 1";
    const log = (name: string) => `  2026-11-01 08:00 gave ${name} 357 mL`;
    // One dKH at once to sea water of TA 2300, DIC 2000 µmol/kg: NaOH to pH 8.446, Na2CO3 to 8.242, NaHCO3 to 7.996
    // on the total scale (CALC). This water is more alkaline, the order and size of the steps are the same.
    const raised = (name: string) => {
      const strict = system(text(log(name), "  limit pH dose 0"), "2026-11-20");
      const told = strict.findings.find(({ code }) => code === "overdose/ph");
      return told?.code === "overdose/ph" && told.of === "dose" ? told.after - told.before : 0;
    };
    expect(raised("caustic")).toBeGreaterThan(0.25);
    expect(raised("caustic")).toBeLessThan(0.41);
    expect(raised("ash")).toBeGreaterThan(0.1);
    expect(raised("ash")).toBeLessThan(0.2);
    expect(raised("bicarbonate")).toBe(0);
    expect(peak(log("bicarbonate"), loose)).toEqual([]);
  });

  it("starts from the pH that other doses since its reading have left", () => {
    const steps = (log: string) =>
      system(text(log, "  limit pH dose 0"), "2026-11-20").findings.flatMap((told) =>
        told.code === "overdose/ph" && told.of === "dose" ? [told] : [],
      );
    // Carbon is closed: two doses at once come to what their sum does.
    const [whole] = steps("  2026-11-01 08:00 gave caustic 400 mL");
    const twice = steps("  2026-11-01 08:00 gave caustic 190 mL\n  2026-11-01 08:00 gave caustic 210 mL");
    expect(twice).toHaveLength(2);
    expect(twice[1]!.before).toBeCloseTo(twice[0]!.after, 2);
    expect(twice[1]!.after).toBeCloseTo(whole!.after, 2);
    const inOneLine = steps("  2026-11-01 08:00 gave caustic 190 mL, caustic 210 mL");
    expect(inOneLine[1]!.after).toBeCloseTo(whole!.after, 2);
    // A pH that was read since says it itself, and so does a day with the air.
    const read = steps(
      "  2026-11-01 08:00 gave caustic 200 mL\n  2026-11-01 08:30 read pH 8.2\n  2026-11-01 08:40 gave caustic 200 mL",
    );
    expect(read[1]!.before).toBeCloseTo(8.2, 2);
    const later = steps("  2026-11-01 08:00 gave caustic 200 mL\n  2026-11-02 08:01 gave caustic 200 mL");
    expect(later[1]!.before).toBeCloseTo(8.1, 2);
  });

  it("more than 0.1 in one dose is told; less isn't", () => {
    expect(peak("  2026-11-01 08:00 gave caustic 150 mL")).toEqual(["overdose/ph: caustic 150 mL"]);
    expect(peak("  2026-11-01 08:00 gave ash 150 mL")).toEqual([]);
  });

  it("a limit on the total scale is compared there", () => {
    // NBS 8.1 is 7.97 total; the dose takes it up by about 0.07.
    const dose = "  2026-11-01 08:00 gave ash 150 mL";
    expect(peak(dose, "  limit pH max 8.1 total")).toEqual([]);
    expect(peak(dose, "  limit pH max 8.0 total")).toEqual(["overdose/ph: ash 150 mL"]);
    expect(peak(dose, "  limit pH max 8.2")).toEqual([]);
    expect(peak(dose, "  limit pH max 8.15")).toEqual(["overdose/ph: ash 150 mL"]);
  });

  it("Ω of aragonite of 7, 12, 30 in grades", () => {
    const grade = (millilitres: number) => {
      const assessment = system(text(`  2026-11-01 08:00 gave caustic ${millilitres} mL`), "2026-11-20");
      const told = assessment.findings.find(({ code }) => code === "overdose/precipitation");
      return told?.code === "overdose/precipitation" ? told.grade : null;
    };
    expect([grade(50), grade(400), grade(1000), grade(4000)]).toEqual([null, "info", "warning", "error"]);
  });

  it("what doesn't touch carbon says nothing", () => {
    expect(peak("  2026-11-01 08:00 gave epsom 1000 mL")).toEqual([]);
  });

  it("the pH of a disregarded line isn't believed", () => {
    const wrong = '  2026-11-01 08:10 read pH 8.8 disregard "dry probe"\n';
    const dose = "  2026-11-01 08:10 gave ash 150 mL";
    expect(peak(wrong + dose)).toEqual(peak(dose));
    expect(peak(wrong.replace(/ disregard.*/, "") + dose)).not.toEqual(peak(dose));
  });

  it("water that wasn't read for a week has no pH after", () => {
    expect(peak("  2026-11-09 08:00 gave caustic 150 mL")).toEqual([]);
  });
});
