/** The standing caution about caustics: where it is told, where one quiet line is left of it, and where it isn't. */
import { describe, expect, test } from "vitest";
import { mended, problems } from "./problems.ts";
import { filesOf, walk } from "./walk.ts";

const vat = "\nsystem vat\n  tank main 500 L\n  by-hand part\n";
const part = (lines: string, more = ""): string => `${more}solution part\n${lines}${vat}`;
const told = (text: string) =>
  walk(filesOf(text)).problems.flatMap(({ code, message }) => (code === "hazard/caustic" ? [message] : []));

describe("told", () => {
  test("at each line of a caustic, with what it does, its heat and the precautions", () =>
    void problems(
      part(
        `  dissolve sodium-hydroxide 40 g
           ^^^^^^^^^^^^^^^^ warning hazard/caustic sodium-hydroxide (NaOH) is caustic: it may be corrosive to metals and causes severe skin burns and eye damage (GHS H290, H314, Danger). It heats the water so strongly that it can boil and spurt. Wear goggles and gloves; put the reagent slowly into cold stirred water, never water onto it; use a plastic vessel, never aluminium or zinc; keep acid away; rinse a splash 15 minutes with water and get medical help. The supplier's safety data sheet and local rules come first.
  dissolve sodium-carbonate 40 g
           ^^^^^^^^^^^^^^^^ warning hazard/caustic it causes serious eye irritation (GHS H319, Warning). It heats the water as it dissolves. Wear goggles
  dissolve sodium-bicarbonate 40 g
  make up to 2 L
`,
      ),
    ));

  test("of the clear part over a sediment", () =>
    void problems(
      part(
        `  saturated calcium-hydroxide
            ^^^^^^^^^^^^^^^^^ warning hazard/caustic calcium-hydroxide (Ca(OH)2) is caustic: it causes skin irritation, causes serious eye damage and may cause respiratory irritation (GHS H315, H318, H335, Danger). Its dust
  keep at 20 degC
`,
      ),
    ));

  test.each([
    ["sodium-carbonate-monohydrate", "Na2CO3·H2O"],
    ["sodium-carbonate-decahydrate", "Na2CO3·10H2O"],
    ["calcium-oxide", "CaO"],
  ])("of %s", (reagent, formula) => {
    const [message] = told(part(`  dissolve ${reagent} 9 g\n  make up to 5 L\n`));
    expect(message).toContain(`${reagent} (${formula}) is caustic`);
  });

  test.each([
    ["is sodium-carbonate purity 99 %", "Na2CO3"],
    ["formula Na2CO3.H2O", "Na2CO3·H2O"],
    ["formula NaOH purity 98 %", "NaOH"],
    ["is inner-name", "Ca(OH)2"],
  ])("of a sack of the farm's own: %s", (line, formula) => {
    const sack = `reagent inner-name\n  is calcium-hydroxide\n\nreagent sack\n  ${line}\n\n`;
    const [message, ...more] = told(part("  dissolve sack 9 g\n  make up to 5 L\n", sack));
    expect(message).toContain(`sack (${formula}) is caustic`);
    expect(more).toEqual([]);
  });

  test.each(["sodium-bicarbonate", "calcium-chloride-dihydrate", "magnesium-sulfate-heptahydrate"])(
    "not of %s",
    (reagent) => {
      expect(told(part(`  dissolve ${reagent} 9 g\n  make up to 5 L\n`))).toEqual([]);
    },
  );

  test("not where sacks are counted", () => {
    const store = "store\n  2026-11-30 08:00 received sodium-hydroxide 5 kg\n\n";
    expect(told(store + part("  dissolve sodium-bicarbonate 9 g\n  make up to 5 L\n"))).toEqual([]);
  });
});

describe("acknowledged", () => {
  test("one quiet line is left, which says who may handle it", () =>
    void problems(
      part(
        `  dissolve sodium-hydroxide 40 g
           ^^^^^^^^^^^^^^^^ info hazard/caustic sodium-hydroxide (NaOH) is caustic. Who may handle it: "ro and ml". The supplier's safety data sheet and local rules come first.
  make up to 2 L
  acknowledge caustic "ro and ml"
`,
      ),
    ));

  test("for the recipe that says so, not for the next one", () => {
    const first = '  dissolve sodium-hydroxide 40 g\n  make up to 2 L\n  acknowledge caustic "ro"\n\n';
    const next = "solution part from 2026-11-01\n  dissolve sodium-hydroxide 80 g\n  make up to 2 L\n";
    const found = walk(filesOf(part(first + next))).problems.filter(({ code }) => code === "hazard/caustic");
    expect(found.map(({ severity }) => severity)).toEqual(["info", "warning"]);
  });

  test("by a fix, at the end of the solution's section", () => {
    const text = part("  dissolve sodium-hydroxide 40 g\n  make up to 2 L # the white can\n\n# Next.\n");
    const after = mended(text, "hazard/caustic", "Acknowledge: say who may handle it");
    expect(after).toBe(
      part(
        '  dissolve sodium-hydroxide 40 g\n  make up to 2 L # the white can\n  acknowledge caustic "say who may handle it"\n\n# Next.\n',
      ),
    );
    expect(walk(filesOf(after)).problems).toMatchObject([{ severity: "info", fixes: [] }]);
  });
});
