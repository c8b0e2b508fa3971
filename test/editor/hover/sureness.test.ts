/** Hovers say how sure a value is: on which scale, before which dose, below what, how old, carried forward or not. */
import { expect, test } from "vitest";
import { toldIn } from "./vat.ts";

/** The paragraphs of the hover before what was assumed, at the line that `|` marks; the line stands without it otherwise. */
function of(farm: string, line: string): string {
  const text = farm.replace(line.replace("|", ""), line);
  if (text === farm) throw new Error(`${line} is no line of the farm`);
  const [told = ""] = (toldIn(text) ?? "").split(/\n\n(?:Written:|\*\*Assumed:\*\*|\*\*After:\*\*)/);
  return told;
}

const vat = (lines: string): string => `system vat\n  tank main 1000 L\n${lines}`;

test("a pH is compared on the scale of what it stands beside", () => {
  // Total is NBS − 0.135 at salinity 35 and 25 °C (Takahashi et al. 1982): 8.1 total is 8.24, 8.1 NBS is 7.96 total.
  const nbs = vat(
    "  hold pH 7.9 to 8.2\n  limit pH max 8.2\nlog vat\n  2026-12-01 06:00 read pH 8.1 total\n",
  );
  expect(of(nbs, "hold p|H 7.9")).toBe(
    "**pH 8.24** now, above its hold of 7.9 to 8.2, 0.19 above its aim of 8.05.\n\nRead 8.10 total 2 h ago (1 Dec 06:00).",
  );
  expect(of(nbs, "limit p|H max")).toBe(
    "**pH 8.24** now, 0.04 above the max of 8.2: beyond it.\n\nRead 2 h ago.",
  );
  expect(of(nbs, "system va|t")).toContain("pH 8.24, above 7.9 to 8.2, read 2 h ago");
  expect(of(nbs, "re|ad pH 8.1 total").split("\n")[0]).toBe("pH 8.1 total (8.24 NBS)");
  expect(of(nbs, "read p|H 8.1 total").split("\n")[0]).toBe(
    "**pH 8.1 total** = 8.24 on the NBS scale; above its hold of 7.9 to 8.2.",
  );
  const total = vat(
    "  hold pH 7.8 to 8.05 total\n  limit pH max 8.0 total\nlog vat\n  2026-12-01 06:00 read pH 8.1\n",
  );
  expect(of(total, "hold p|H 7.8")).toBe(
    "**pH 7.96 total** now, in its hold of 7.8 to 8.05 total, 0.04 above its aim of 7.93 total.\n\nRead 8.10 (NBS) 2 h ago (1 Dec 06:00).",
  );
  expect(of(total, "limit p|H max")).toBe(
    "**pH 7.96 total** now, 0.04 below the max of 8 total.\n\nRead 2 h ago.",
  );
});

test("a second recipe tells its own strength, and when it counts", () => {
  const farm =
    "solution soda\n  supplies alkalinity 1 meq/mL\nsolution soda from 2026-12-10\n  supplies alkalinity 2 meq/mL\n";
  expect(of(farm, "solution so|da from 2026-12-10")).toBe(
    "1 mL of soda brings 2 meq of alkalinity.\n\nCounts from 2026-12-10 00:00 on, not yet.\n\nNo system uses it.\n\nCaustic. Wear goggles and gloves.",
  );
  expect(of(farm, "suppl|ies alkalinity 2 meq/mL")).toContain("1 mL of soda brings 2 meq of alkalinity.");
  expect(of(farm, "solution so|da\n")).toBe(
    "1 mL of soda brings 1 meq of alkalinity.\n\nNo system uses it.\n\nCaustic. Wear goggles and gloves.",
  );
});

const lye = `
solution lye
  supplies alkalinity 1 meq/mL as hydroxide
`;

test("a pH read before an alkaline dose isn't that of now", () => {
  const farm =
    vat(`  hold pH 7.9 to 8.4
  limit pH max 8.5
  by-hand lye
log vat
  2026-12-01 06:00 read alkalinity 8 dKH, pH 8.1
  2026-12-01 07:00 gave lye 20 mL
  2026-12-01 07:30 gave lye 30 mL
`) + lye;
  const before = "read 06:00, before 2 alkaline doses, the last of lye at 07:30";
  expect(of(farm, "hold p|H")).toBe(
    `**pH 8.10** ${before}, in its hold of 7.9 to 8.4, 0.05 below its aim of 8.15.\n\nRead 8.10 2 h ago (1 Dec 06:00).`,
  );
  expect(of(farm, "limit p|H")).toContain(`**pH 8.10** ${before}, 0.40 below the max of 8.5.`);
  expect(of(farm, "system va|t")).toContain(`pH 8.10, in 7.9 to 8.4, ${before}`);
  expect(of(farm, "ga|ve lye 30 mL")).toContain(
    "It starts from the pH read 06:00, before the dose of lye at 07:00; what doses of the 24 h before brought is reckoned in.",
  );
  expect(of(farm, "ga|ve lye 20 mL")).not.toContain("It starts from");
});

test("a test that only showed less than something", () => {
  const farm = vat(`  hold calcium 400 to 440 mg/L
  hold nitrate 2 to 10 mg/L
  limit calcium max 500 mg/L
log vat
  2026-11-30 08:00 read calcium below 300 mg/L, nitrate below 5 mg/L
`);
  expect(of(farm, "hold calc|ium")).toBe(
    "**calcium below 300 mg/L** as read 24 h ago, below its hold of 400 to 440 mg/L.\n\nRead below 300 mg/L 24 h ago (30 Nov 08:00).",
  );
  expect(of(farm, "hold nitr|ate")).toBe(
    "**nitrate below 5.0 mg/L** as read 24 h ago, whether that is in its hold of 2 to 10 mg/L can't be told.\n\nRead below 5.0 mg/L 24 h ago (30 Nov 08:00).",
  );
  expect(of(farm, "limit calc|ium")).toContain(
    "**calcium below 300 mg/L** as read 24 h ago, below the max of 500 mg/L.",
  );
  const system = of(farm, "system va|t");
  expect(system).toContain("calcium below 300 mg/L, below 400 to 440, read 24 h ago");
  expect(system).toContain("nitrate below 5.0 mg/L, can't be told whether in 2 to 10, read 24 h ago");
  // A newer test gainsays what is carried forward: both are told.
  const gainsaid = vat(`  hold calcium 400 to 440 mg/L
  uptake calcium 1 mg/L/day
log vat
  2026-11-29 08:00 read calcium 420 mg/L
  2026-11-30 08:00 read calcium below 300 mg/L
`);
  expect(of(gainsaid, "hold calc|ium")).toBe(
    "**calcium below 300 mg/L** as read 24 h ago, below its hold of 400 to 440 mg/L.\n\nRead below 300 mg/L 24 h ago (30 Nov 08:00). ↵\nReckoned from the number read before (29 Nov 08:00) it would be 418 mg/L, and the plan goes by that: test again.",
  );
});

test("a stale value isn't told as of now, and drifts nowhere", () => {
  const farm = vat(`  hold alkalinity 7.6 to 8.4 dKH
  limit alkalinity max 11 dKH
  uptake alkalinity 0.3 dKH/day
log vat
  2026-10-01 08:00 read alkalinity 8.0 dKH
`);
  expect(of(farm, "hold alk|alinity")).toBe(
    "**alkalinity** stale: last read 61 days ago, 8.0 dKH; test again.\n\nIt is to be held at 7.6 to 8.4 dKH.",
  );
  expect(of(farm, "limit alk|alinity")).toBe(
    "**alkalinity** stale: last read 61 days ago, 8.0 dKH; test again.\n\nThe max is 11 dKH.",
  );
  expect(of(farm, "system va|t")).toContain(
    "alkalinity stale: last read 61 days ago, 8.0 dKH; test again; hold 7.6 to 8.4 dKH\n",
  );
});

test("without an uptake or a volume a value stands as read, and says why", () => {
  // 2000 meq in 1000 L are 2 meq/L, 5.6 dKH.
  const farm =
    vat(`  hold alkalinity 7.6 to 8.4 dKH
  limit alkalinity max 11 dKH
log vat
  2026-11-30 08:00 read alkalinity 7.2 dKH
  2026-11-30 09:00 gave lye 2 L
`) + lye;
  expect(of(farm, "hold alk|alinity")).toBe(
    "**alkalinity 7.2 dKH** as read 24 h ago, below its hold of 7.6 to 8.4 dKH, 0.8 dKH below its aim of 8 dKH.\n\nRead 7.2 dKH 24 h ago (30 Nov 08:00). ↵\nIt isn't carried forward from there: what the corals take of alkalinity isn't known. ↵\nWith what came in since, and nothing taken, it would be 12.8 dKH.",
  );
  expect(of(farm, "limit alk|alinity")).toContain("Give nothing that raises it until a test shows it below.");
  const dry =
    "system vat\n  hold alkalinity 7.6 to 8.4 dKH\n  cohort frags 10 pieces uptake 1 meq/day each\nlog vat\n  2026-11-30 08:00 read alkalinity 7.9 dKH\n";
  expect(of(dry, "hold alk|alinity")).toBe(
    "**alkalinity 7.9 dKH** as read 24 h ago, in its hold of 7.6 to 8.4 dKH, 0.1 dKH below its aim of 8 dKH.\n\nRead 7.9 dKH 24 h ago (30 Nov 08:00). ↵\nIt isn't carried forward from there: the volume of the water isn't known.",
  );
  expect(of(dry, "system va|t")).toContain("Not known: the volume of the water isn't known.");
});

test("set: what the doses bring where the uptake isn't known", () => {
  // 100 mL of 1 meq/mL in 1000 L: 0.1 meq/L, 0.28 dKH.
  const farm =
    vat(`  hold alkalinity 7.6 to 8.4 dKH
  hold potassium 380 to 420 mg/L
  pump p gives lye at 10 mL/min holding 5 L
log vat
  2026-11-30 08:00 set p 100 mL/day
`) + lye;
  expect(of(farm, "se|t p 100 mL/day").split("\n")[0]).toBe(
    "**From then on:** alkalinity: the doses bring 0.28 dKH a day, uptake not known; potassium: the doses bring nothing, uptake not known.",
  );
});

test("a pump's container: what is left by what was set, the calibrated flow beside the stated one", () => {
  const farm =
    vat(`  pump p gives lye at 10 mL/min holding 5 L
log vat
  2026-11-25 08:00 set p 300 mL/day
  2026-11-25 08:00 filled p to 3 L
  2026-11-27 08:00 stopped p
  2026-11-28 08:00 started p
  2026-11-29 08:00 set p 450 mL/day
  2026-11-30 08:00 calibrated p 45 mL in 5 min
`) + lye;
  // Set in the minute of filling: 3000 / 300.
  expect(of(farm, "fil|led p to 3 L")).toBe(
    "p: 3.0 L, 60 % of what it holds; lasts 10 days at 300 mL a day as set.",
  );
  // 2 d × 300, 1 d stopped, 1 d × 300, 2 d × 450: 1800 of 3000 mL.
  expect(of(farm, "pump |p gives")).toContain(
    "Can give: 10 mL/min as stated (9 mL/min calibrated on 30 Nov 08:00), at most 14 L a day. ↵\nIts container was filled to 3.0 L on 25 Nov 08:00; about 1.2 L are left by what was set since, 2.7 days as set.",
  );
  const unknown = vat("  pump p gives lye at 10 mL/min holding 5 L\n") + lye;
  expect(of(unknown, "pump |p gives")).toContain(
    "Its container holds 5.0 L; how full it is isn't in the log.",
  );
});

test("temperature and salinity in the units of the file", () => {
  // 77 °F is 25 °C; the middle of 1.0250 and 1.0270 is 1.0260.
  const farm = vat(`  hold temperature 75 to 79 degF
  hold salinity 1.0250 to 1.0270 SG
  limit temperature swing 2 degF
log vat
  2026-12-01 06:00 read temperature 77 degF, salinity 1.026 SG
`);
  expect(of(farm, "hold temp|erature")).toContain(
    "**temperature 77.0 degF** now, in its hold of 75 to 79 degF, at its aim.",
  );
  expect(of(farm, "hold sal|inity")).toContain(
    "**salinity 1.0260 SG** now, in its hold of 1.025 to 1.027 SG, at its aim.",
  );
  expect(of(farm, "limit temp|erature swing")).toContain("The limit is 2 degF within a day");
  expect(of(farm, "read temp|erature 77 degF")).toBe(
    "**temperature 77 degF** = 25 degC; in its hold of 75 to 79 degF.",
  );
});

test("small things said right", () => {
  const farm =
    vat(`  hold alkalinity 7.6 to 8.4 dKH
  limit pH dose 0.05
  uptake alkalinity 0.3 dKH/day
  evaporates 10 L/day
  top-off lye 100 L
  by-hand lye
log vat
  2026-12-01 06:00 read alkalinity 8 dKH, pH 8.1
  2026-12-01 06:00 read calcium 4200 mg/L
  2026-12-01 06:30 gave lye 200 mL
  2026-12-01 07:00 renewed 1200 L with sea
saltwater sea
  salinity 35
  alkalinity 7 dKH
  2026-11-15 read alkalinity 7.4 dKH
`) + lye;
  expect(of(farm, "ren|ewed 1200 L").split("\n")[0]).toBe(
    "All of the water renewed: 1200 L, more than the 1000 L that there are, with sea.",
  );
  expect(of(farm, "lo|g vat").split("\n")[0]).toBe(
    "Last read 1 Dec 06:00, 2 h ago: alkalinity 8 dKH, pH 8.1; calcium 4200 mg/L (impossible in sea water, left out: calcium)",
  );
  expect(of(farm, "top-o|ff lye 100 L")).toContain("Caustic. Wear goggles and gloves.");
  expect(of(farm, "saltwater s|ea")).toContain("sea: salinity 35.0, alkalinity 7.4 dKH (from 15 Nov on).");
  expect(of(farm, "re|ad alkalinity 7.4 dKH")).toBe(
    "sea from 15 Nov 12:00 on: alkalinity 7.4 dKH.\n\nIt counts instead of what is stated.",
  );
  expect(of(farm, "system va|t")).toContain(
    '**Error:** at "2026-12-01 06:00 read calcium 4200 mg/L": Sea water can',
  );
});
