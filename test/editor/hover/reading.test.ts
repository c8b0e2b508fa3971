/** Hovers on readings. */
import { expect, test } from "vitest";
import { hovers, toldIn } from "./vat.ts";

test("a whole line: the carbonate system first, then its values", () => {
  // Total is NBS − 0.13 at 38 and 25 °C. Reads of one minute are one reading: salinity stands on another line.
  hovers(
    "  2026-11-30 08:00 re|ad alkalinity 8 dKH, calcium 420 mg/L, pH 8.2, temperature 25 degC with bench",
    `
**Carbonate system:** pH 8.07 (total), pCO2 445 µatm, DIC 2400 µmol/kg, Ω 4.0 of aragonite

alkalinity 8 dKH; at the salinity aim (35) it would be 7.4 dKH, since salinity was 38.0 ↵
calcium 420 mg/L; at the salinity aim (35) it would be 386 mg/L, since salinity was 38.0 ↵
pH 8.2 (NBS) ↵
temperature 25 degC

bench read alkalinity 0.40 dKH too high when it was checked on 11 Nov; that isn't taken off in any estimate yet. ↵
With bench.

Written: \`DATE [TIME] read PARAMETER [below] q, … [with KIT] [disregard "text"] [by WHO]\`

**Assumed:** Common practice – pH scale: NBS. ↵
**After:** Lueker et al. 2000, Dickson 1990 and Millero 1995 (constants), Mucci 1983 (Ω), Uppström 1974 (boron); Takahashi et al. 1982 (NBS scale); Millero and Poisson 1981 (density).`,
  );
});

test("a value: other units, the salinity aim, the kit", () => {
  // 420 / 1.0256 = 409.5 mg/kg; / 40.078 = 10.48 mmol/L; × 100.086 / 40.078 = 1049 mg/L as CaCO3.
  // At salinity 35: 420 × 35 / 38 × 1.0233 / 1.0256 = 386.
  hovers(
    "  2026-11-30 08:00 read alkalinity 8 dKH, calcium 42|0 mg/L, pH 8.2, temperature 25 degC with bench",
    `
**calcium 420 mg/L** = 1050 mg/L as CaCO3 = 410 mg/kg = 10.5 mmol/L; in its hold of 400 to 440 mg/L.

At the salinity aim (35) it would be 386 mg/L, since salinity was 38.0. ↵
Tests with bench scatter by 2 % (one standard deviation).

**Assumed:** The water of vat then – density of the water: 1.0256 kg/L, of salinity 38.0 at 25.0 °C. ↵
**After:** Millero and Poisson 1981 (density).`,
  );
});

test("a value: the water carried forward to that moment, just before it", () => {
  // 8.03 dKH after the renewal at 20:00, 0.16 a day less for 11 h: 7.95.
  hovers(
    "  2026-12-01 07:00 read alkal|inity 7.5 dKH ± 0.1 with bench",
    `
**alkalinity 7.5 dKH** = 2.67 meq/L = 2610 umol/kg = 134 mg/L as CaCO3; in its hold of 7 to 9 dKH.

Expected 8.0 dKH, 0.5 dKH more than was read. ↵
At the salinity aim (35) it would be 6.9 dKH, since salinity was 37.7. ↵
Tests with bench scatter by 0.10 dKH (one standard deviation). ↵
bench read alkalinity 0.40 dKH too high when it was checked on 11 Nov; that isn't taken off in any estimate yet.

Without pH read within the hour, pCO2, DIC and Ω can't be told.

**Assumed:** The water of vat then – density of the water: 1.0254 kg/L, of salinity 37.7 at 25.0 °C. ↵
**Assumed:** No estimate from the log yet – the day's course: uptake and doses even through the day. ↵
**After:** Millero and Poisson 1981 (density).`,
  );
});

const half = (line: string): string =>
  `
system vat
  tank main 1000 L
log vat
  2026-12-01 07:00 read alkalinity 3 meq/L
  2026-12-01 07:30 read pH 8.0 total, salinity 35, temperature 25 degC, calcium 412 mg/L
`.replace(line.replace("|", ""), line);

test("alkalinity and pH of two lines within the hour belong together; it is told at both", () => {
  // 3 meq/L / 1.0233 = 2932 µmol/kg.
  expect(toldIn(half("read alkal|inity 3 meq/L"))).toContain("(with pH read 1 Dec 07:30)");
  expect(toldIn(half("read p|H 8.0 total"))).toContain("**Carbonate system:** pH 8.00 (total), pCO2");
});

test("below, disregarded, impossible: said so", () => {
  const line = (read: string) => `system vat\n  tank main 1000 L\nlog vat\n  2026-12-01 07:00 ${read}\n`;
  expect(toldIn(line("read nitr|ate below 2 mg/L"))).toBe(
    "**nitrate below 2 mg/L** = 1.95 mg/kg = 32.3 umol/L.\n\n**Assumed:** The water of vat then – density of the water: 1.0233 kg/L, of salinity 35.0 at 25.0 °C. ↵\n**After:** Millero and Poisson 1981 (density).",
  );
  expect(toldIn(line('read calc|ium 420 mg/L disregard "wrong vial"'))).toContain(
    "Disregarded: it counts in no estimate.",
  );
  expect(toldIn(line("read calc|ium 4200 mg/L"))).toContain("Left out of every estimate: calcium.");
});
