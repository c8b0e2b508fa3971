/** The water carried from event to event, against closed forms written out. A litre of part brings 1 meq/L to the 1000 L here. */
import { describe, expect, it } from "vitest";
import { now, system } from "./fixture.ts";

const shelf = `
solution ash
  supplies alkalinity 1 meq/mL as carbonate
solution chloride
  supplies calcium 40 mg/mL
solution lime
  supplies alkalinity 0.04 meq/mL as hydroxide
saltwater mix
  salinity 35
  alkalinity 2 meq/L
  calcium 400 mg/L
`;

/** A vat of 1000 L with a reading of 3 meq/L and 420 mg/L on 1 November at 08:00. */
const vat = (facts: string, log = ""): string => `${shelf}
system vat
  tank main 1000 L
${facts}

log vat
  2026-11-01 08:00 read alkalinity 3 meq/L, calcium 420 mg/L, salinity 35
${log}
`;

const alkalinity = (facts: string, log: string, moment: string) =>
  now(system(vat(facts, log), moment), "alkalinity");

const pump = "  pump one gives ash at 40 mL/min";
const uptake = "  uptake alkalinity 0.1 meq/L/day";

describe("between events", () => {
  it("uptake takes and a pump gives, evenly", () => {
    expect(alkalinity(uptake, "", "2026-11-03 08:00")).toBeCloseTo(3 - 2 * 0.1, 12);
    expect(alkalinity(uptake, "", "2026-11-01 14:00")).toBeCloseTo(3 - 0.25 * 0.1, 12);
    // 50 mL/day is 0.05 meq/L a day; set from noon on, 44 of 48 hours.
    const set = "  2026-11-01 12:00 set one 50 mL/day";
    expect(alkalinity(`${pump}\n${uptake}`, set, "2026-11-03 08:00")).toBeCloseTo(
      3 - 0.2 + (0.05 * 44) / 24,
      12,
    );
  });

  it("a newer rate replaces the one before, also by the solution's name", () => {
    const log = "  2026-11-01 08:00 set one 50 mL/day\n  2026-11-02 08:00 set ash 80 mL/day";
    expect(alkalinity(`${pump}\n${uptake}`, log, "2026-11-03 08:00")).toBeCloseTo(3 - 0.2 + 0.05 + 0.08, 12);
  });

  it("a pump that is stopped gives nothing until it is started", () => {
    const log = `  2026-11-01 08:00 set one 50 mL/day
  2026-11-01 20:00 stopped one
  2026-11-02 20:00 started one`;
    // 12 hours before and 12 after.
    expect(alkalinity(`${pump}\n${uptake}`, log, "2026-11-03 08:00")).toBeCloseTo(3 - 0.2 + 0.05, 12);
  });

  it("what always runs runs, and no less is set", () => {
    const always = "  pump one gives ash at 40 mL/min always 30 mL/day";
    expect(alkalinity(`${always}\n${uptake}`, "", "2026-11-02 08:00")).toBeCloseTo(3 - 0.1 + 0.03, 12);
    const set = "  2026-11-01 08:00 set one 10 mL/day";
    expect(alkalinity(`${always}\n${uptake}`, set, "2026-11-02 08:00")).toBeCloseTo(3 - 0.1 + 0.03, 12);
  });

  it("a source out of force gives nothing", () => {
    const log = "  2026-11-01 08:00 set one 50 mL/day";
    const gone = `${pump} until 2026-11-02 08:00\n${uptake}`;
    expect(alkalinity(gone, log, "2026-11-03 08:00")).toBeCloseTo(3 - 0.2 + 0.05, 12);
  });

  it("facts change in between", () => {
    const facts = `${uptake} until 2026-11-02 08:00\n  uptake alkalinity 0.2 meq/L/day from 2026-11-02 08:00`;
    expect(alkalinity(facts, "", "2026-11-03 08:00")).toBeCloseTo(3 - 0.1 - 0.2, 12);
    // The same amount from half the water is twice the change.
    const volume = "  uptake alkalinity 100 meq/day\n  measured volume 500 L from 2026-11-02 08:00";
    expect(alkalinity(volume, "", "2026-11-03 08:00")).toBeCloseTo(3 - 0.1 - 0.2, 12);
  });

  it("recipes change in between, of a pump and of the top-off", () => {
    const stronger = `
solution ash from 2026-11-02 00:00
  supplies alkalinity 3 meq/mL as carbonate
solution lime from 2026-11-02 00:00
  supplies alkalinity 0.08 meq/mL as hydroxide
`;
    const pumped = vat(`${pump}\n${uptake}`, "  2026-11-01 08:00 set one 24 mL/day") + stronger;
    // 16 hours at 0.024 and 32 at 0.072 meq/L a day.
    expect(now(system(pumped, "2026-11-03 08:00"), "alkalinity")).toBeCloseTo(3 - 0.2 + 0.016 + 0.096, 12);
    const topped = vat(`${uptake}\n  evaporates 6 L/day\n  top-off lime 100 L`) + stronger;
    // 6 L/day of 40 meq/L are 0.24 meq/L a day, then 0.48: 16 hours and 32.
    expect(now(system(topped, "2026-11-03 08:00"), "alkalinity")).toBeCloseTo(3 - 0.2 + 0.16 + 0.64, 12);
  });

  it("limewater makes up what evaporates", () => {
    const facts = `${uptake}\n  evaporates 10 L/day\n  top-off lime 100 L`;
    // 10 L of 40 meq/L in 1000 L.
    expect(alkalinity(facts, "", "2026-11-02 08:00")).toBeCloseTo(3 - 0.1 + 0.4, 12);
    expect(
      alkalinity(`${uptake}\n  evaporates 10 L/day\n  top-off 100 L`, "", "2026-11-02 08:00"),
    ).toBeCloseTo(2.9, 12);
  });

  it("flow-through draws towards its water", () => {
    const facts = `${uptake}\n  flows-through 100 L/day with mix`;
    // C' = −0.1 + 0.1 (2 − C): settles at 1, so C = 1 + 2 e^(−0.1 t).
    expect(alkalinity(facts, "", "2026-11-05 08:00")).toBeCloseTo(1 + 2 * Math.exp(-0.4), 12);
  });

  it("the water that flows through may change", () => {
    const changed =
      vat(`${uptake}\n  flows-through 100 L/day with well`) +
      `
saltwater well
  salinity 35
  alkalinity 2 meq/L
  2026-11-02 08:00 read alkalinity 4 meq/L
`;
    // A day towards 1, then a day towards 3.
    const afterOne = 1 + 2 * Math.exp(-0.1);
    expect(now(system(changed, "2026-11-03 08:00"), "alkalinity")).toBeCloseTo(
      3 + (afterOne - 3) * Math.exp(-0.1),
      12,
    );
  });

  it("the skeleton takes calcium and magnesium with it", () => {
    const facts = `${uptake}\n  skeleton magnesium 4 %`;
    const log = "  2026-11-01 08:00 read magnesium 1300 mg/L";
    const assessment = system(vat(facts, log), "2026-11-03 08:00");
    // Per meq: (1 − x)/2 mmol of Ca (40.078) and x/2 of Mg (24.305).
    expect(now(assessment, "calcium")).toBeCloseTo(420 - 0.2 * 0.48 * 40.078, 10);
    expect(now(assessment, "magnesium")).toBeCloseTo(1300 - 0.2 * 0.02 * 24.305, 10);
  });

  it("never falls below zero", () => {
    expect(alkalinity("  uptake alkalinity 1 meq/L/day", "", "2026-11-06 08:00")).toBe(0);
    const back = "  2026-11-06 08:00 gave ash 500 mL";
    expect(alkalinity("  uptake alkalinity 1 meq/L/day", back, "2026-11-06 08:00")).toBeCloseTo(0.5, 12);
  });

  it("without a known uptake only what happens at once counts", () => {
    const log = "  2026-11-01 08:00 set one 50 mL/day\n  2026-11-02 08:00 gave ash 100 mL";
    expect(alkalinity(pump, log, "2026-11-03 08:00")).toBeCloseTo(3.1, 12);
  });

  it("potassium and strontium, whose uptake nobody states, are carried with what is given", () => {
    const potash = `${vat("  by-hand potash", "  2026-11-01 08:00 read potassium 400 mg/L\n  2026-11-01 08:00 set potash 100 mL/day")}
solution potash
  supplies potassium 50 mg/mL
`;
    // 100 mL of 50 mg/mL in 1000 L are 5 mg/L a day.
    expect(now(system(potash, "2026-11-03 08:00"), "potassium")).toBeCloseTo(410, 12);
  });
});

describe("an event", () => {
  it("a dose is there at once", () => {
    expect(alkalinity(uptake, "  2026-11-02 08:00 gave ash 100 mL", "2026-11-02 08:00")).toBeCloseTo(
      3 - 0.1 + 0.1,
      12,
    );
    expect(alkalinity(uptake, "  2026-11-02 08:00 topped 5 L with lime", "2026-11-02 08:00")).toBeCloseTo(
      3 - 0.1 + 0.2,
      12,
    );
    expect(alkalinity(uptake, "  2026-11-02 08:00 topped 5 L", "2026-11-02 08:00")).toBeCloseTo(2.9, 12);
  });

  it("an exchange drains, then fills", () => {
    expect(alkalinity(uptake, "  2026-11-02 08:00 renewed 100 L with mix", "2026-11-02 08:00")).toBeCloseTo(
      2.9 * 0.9 + 2 * 0.1,
      12,
    );
    expect(alkalinity(uptake, "  2026-11-02 08:00 renewed 5000 L with mix", "2026-11-02 08:00")).toBeCloseTo(
      2,
      12,
    );
  });

  it("an exchange with another system takes its last reading", () => {
    const two = `${vat(uptake, "  2026-11-02 08:00 renewed 100 L with other")}
system other
  tank main 100 L
  hold calcium 400 to 440 mg/L aim 410
log other
  2026-10-30 08:00 read alkalinity 4 meq/L
  2026-11-01 08:00 read alkalinity 9 meq/L disregard "no"
  2026-11-02 09:00 read alkalinity 5 meq/L
`;
    const text = two.replace("9 meq/L", "4.5 meq/L");
    const assessment = system(text, "2026-11-02 08:00", "vat");
    expect(now(assessment, "alkalinity")).toBeCloseTo(2.9 * 0.9 + 0.4, 12);
    // Never read there: what it holds.
    const taken = 0.1 * 0.4975 * 40.078;
    expect(now(assessment, "calcium")).toBeCloseTo((420 - taken) * 0.9 + 41, 8);
  });

  it("a reading stands as read, but for what is disregarded, below a value or impossible", () => {
    expect(
      alkalinity(uptake, "  2026-11-02 08:00 read alkalinity 2.5 meq/L", "2026-11-03 08:00"),
    ).toBeCloseTo(2.4, 12);
    expect(
      alkalinity(uptake, '  2026-11-02 08:00 read alkalinity 2.5 meq/L disregard "no"', "2026-11-03 08:00"),
    ).toBeCloseTo(2.8, 12);
    expect(
      alkalinity(uptake, "  2026-11-02 08:00 read alkalinity below 2.5 meq/L", "2026-11-03 08:00"),
    ).toBeCloseTo(2.8, 12);
  });

  it("after the moment waits", () => {
    const log = "  2026-11-02 08:01 gave ash 100 mL\n  2026-11-02 08:00 gave ash 10 mL"
      .split("\n")
      .sort()
      .join("\n");
    expect(alkalinity(uptake, log, "2026-11-02 08:00")).toBeCloseTo(3 - 0.1 + 0.01, 12);
    expect(alkalinity(uptake, log, "2026-11-02 08:01")).toBeCloseTo(3 - (0.1 * 1441) / 1440 + 0.11, 12);
  });

  it("before any, the moment is still the one asked for", () => {
    const facts = `${uptake}\n  hold alkalinity 2.7 to 3.1 meq/L until 2026-10-20\n  hold alkalinity 1 to 2 meq/L from 2026-10-20`;
    const assessment = system(vat(facts), "2026-10-10 08:00");
    expect(assessment.state.minute).toBe(assessment.at);
    expect(assessment.state.carried.alkalinity).toBeNull();
    expect(assessment.plan).toBeNull();
  });
});

describe("corals", () => {
  const cohort = "  cohort plugs 100 pieces uptake 1 meq/day each";

  it("that come and go change what is taken", () => {
    const log = `  2026-11-02 08:00 stocked plugs 100 pieces
  2026-11-03 08:00 removed plugs 50 pieces`;
    // 0.1, 0.2, then 0.15 meq/L a day.
    expect(alkalinity(cohort, log, "2026-11-04 08:00")).toBeCloseTo(3 - 0.1 - 0.2 - 0.15, 12);
  });

  it("counted at a date have in it who came before", () => {
    const counted = "  cohort plugs 100 pieces uptake 1 meq/day each from 2026-11-02 08:00";
    const log = "  2026-11-01 09:00 stocked plugs 50 pieces";
    expect(alkalinity(counted, log, "2026-11-03 08:00")).toBeCloseTo(3 - 0.1, 12);
    const recounted = `${cohort}\n  cohort plugs 300 pieces uptake 1 meq/day each from 2026-11-02 08:00`;
    expect(alkalinity(recounted, log, "2026-11-03 08:00")).toBeCloseTo(
      3 - 0.1 / 24 - (0.15 * 23) / 24 - 0.3,
      12,
    );
  });

  it("can't be fewer than none", () => {
    const log = "  2026-11-01 08:00 removed plugs 500 pieces\n  2026-11-02 08:00 stocked plugs 20 pieces";
    expect(alkalinity(cohort, log, "2026-11-03 08:00")).toBeCloseTo(3 - 0.02, 12);
  });

  it("as a whole take in proportion to how many are left", () => {
    const whole = "  cohort plugs 100 pieces uptake 100 meq/day";
    expect(alkalinity(whole, "  2026-11-01 08:00 removed plugs 25 pieces", "2026-11-02 08:00")).toBeCloseTo(
      3 - 0.075,
      12,
    );
  });

  it("of an area take by the square metre", () => {
    const crust = "  cohort crust 0.5 m2 uptake 200 meq/m2/day";
    expect(alkalinity(crust, "  2026-11-02 08:00 removed crust 2500 cm2", "2026-11-03 08:00")).toBeCloseTo(
      3 - 0.1 - 0.05,
      12,
    );
  });

  it("moved between systems take there what they took here", () => {
    const two = `${vat(cohort, "  2026-11-02 08:00 moved plugs 40 pieces to other")}
system other
  tank main 1000 L
  cohort plugs 10 pieces uptake 2 meq/day each
log other
  2026-11-01 08:00 read alkalinity 3 meq/L
`;
    expect(now(system(two, "2026-11-03 08:00", "vat"), "alkalinity")).toBeCloseTo(3 - 0.1 - 0.06, 12);
    expect(now(system(two, "2026-11-03 08:00", "other"), "alkalinity")).toBeCloseTo(3 - 0.02 - 0.1, 12);
  });

  it("grow week by week, from when they were counted", () => {
    const grown = "  cohort plugs 100 pieces uptake 1 meq/day each grows 5 %/week from 2026-10-11 08:00";
    // Three weeks after the count: 1.05³; over the next week the integral of 0.1 × 1.05^(t/7).
    const taken = (days: number) => (0.1 * 7 * 1.05 ** 3 * (1.05 ** (days / 7) - 1)) / Math.log(1.05);
    expect(alkalinity(grown, "", "2026-11-02 08:00")).toBeCloseTo(3 - taken(1), 6);
    expect(alkalinity(grown, "", "2026-11-08 08:00")).toBeCloseTo(3 - taken(7), 3);
    // However late it is asked, the week carried is the same.
    expect(alkalinity(grown, "", "2027-03-08 08:00")).toBeCloseTo(3 - taken(7), 3);
  });
});

describe("seven days", () => {
  const facts = `${uptake}\n  hold alkalinity 2 to 4 meq/L\n  hold calcium 380 to 440 mg/L`;

  it("a value is carried, then it stays and is stale", () => {
    const fresh = system(vat(facts), "2026-11-08 08:00");
    expect(now(fresh, "alkalinity")).toBeCloseTo(3 - 0.7, 12);
    expect(fresh.staleParameters).toEqual([]);
    const late = system(vat(facts), "2026-11-08 08:01");
    expect(now(late, "alkalinity")).toBeCloseTo(3 - 0.7, 12);
    expect(late.staleParameters).toEqual(["alkalinity", "calcium"]);
    expect(now(system(vat(facts), "2026-12-08 08:00"), "alkalinity")).toBeCloseTo(3 - 0.7, 12);
  });

  it("each parameter by itself", () => {
    const log = "  2026-11-05 08:00 read alkalinity 2.8 meq/L";
    const assessment = system(vat(facts, log), "2026-11-10 08:00");
    expect(assessment.staleParameters).toEqual(["calcium"]);
    expect(now(assessment, "alkalinity")).toBeCloseTo(2.8 - 0.5, 12);
    expect(now(assessment, "calcium")).toBeCloseTo(420 - 0.7 * 0.4975 * 40.078, 8);
  });

  it("what is never read is stale, what isn't held isn't", () => {
    const assessment = system(vat(`${facts}\n  hold magnesium 1280 to 1360 mg/L`), "2026-11-02 08:00");
    expect(assessment.staleParameters).toEqual(["magnesium"]);
  });

  it("no dose moves a stale value", () => {
    const log = "  2026-11-20 08:00 gave ash 100 mL\n  2026-11-20 09:00 renewed 500 L with mix";
    expect(alkalinity(facts, log, "2026-11-21 08:00")).toBeCloseTo(2.3, 12);
  });
});

describe("salt", () => {
  it("of a dose stays", () => {
    const soda = `${vat(uptake, "  2026-11-01 08:00 gave soda 100 mL")}
solution soda
  dissolve sodium-carbonate 105.988 g
  make up to 1 L
`;
    // 10.5988 g in 1000 L; 35.16504 g/kg are 35 of salinity (Millero et al. 2008), sea water 1.0233 kg/L.
    const rise = 0.0105988 / 1.0233 / (35.16504 / 35);
    expect(now(system(soda, "2026-11-01 08:00"), "salinity")).toBeCloseTo(35 + rise, 10);
  });

  it("is taken by the skeleton: 0.05 g of CaCO3 a meq", () => {
    const taken = (0.1 * 0.050043) / 1.0233 / (35.16504 / 35);
    expect(now(system(vat(uptake), "2026-11-02 08:00"), "salinity")).toBeCloseTo(35 - taken, 10);
  });
});
