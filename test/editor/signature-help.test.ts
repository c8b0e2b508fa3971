import { expect, test } from "vitest";
import { signatureHelp } from "../../server/editor/signature-help.ts";
import { cursorIn } from "./fixture.ts";

/** The form that fits, its current part marked with « ». */
function marked(text: string): string | null {
  const { farm, cursor } = cursorIn(text);
  const help = signatureHelp(farm, cursor);
  if (!help) return null;
  const { label, parts, active } = help.signatures[help.active]!;
  const part = active === null ? null : parts[active]!;
  if (!part) return label;
  return `${label.slice(0, part.start)}«${label.slice(part.start, part.end)}»${label.slice(part.end)}`;
}

const dates = "[from DATE [TIME]] [until DATE [TIME]]";
const system = (line: string) => marked(`system vat\n  ${line}`);
const logged = (line: string) => marked(`log vat\n  2026-12-01 08:00 ${line}`);

test("tank: the shape that is being written, of all its shapes", () => {
  const rest = `[times N] ${dates}`;
  expect(system("tank |")).toBe(`tank «NAME» q [x q x q] ${rest}`);
  expect(system("tank a|")).toBe(`tank «NAME» q [x q x q] ${rest}`);
  expect(system("tank a |")).toBe(`tank NAME «q» [x q x q] ${rest}`);
  expect(system("tank a 310 |")).toBe(`tank NAME «q» [x q x q] ${rest}`);
  expect(system("tank a 310 cm x 80 |")).toBe(`tank NAME q «[x q x q]» ${rest}`);
  expect(system("tank a 310 cm x 80 cm x 28 cm |")).toBe(`tank NAME q [x q x q] «[times N]» ${dates}`);
  expect(system("tank a round |")).toBe(`tank NAME round «q» x q ${rest}`);
  expect(system("tank a round 120 cm |")).toBe(`tank NAME round q «x» q ${rest}`);
  expect(system("tank a cone 120 cm x |")).toBe(`tank NAME cone q x «q» ${rest}`);
  const { farm, cursor } = cursorIn("system vat\n  tank a round |");
  expect(signatureHelp(farm, cursor)!.signatures.map(({ label }) => label.slice(0, 20))).toEqual([
    ...["tank NAME round q x ", "tank NAME cone q x q", "tank NAME q [x q x q"],
  ]);
});

test("hold and limit", () => {
  const rest = `[aim q] ${dates}`;
  expect(system("hold |")).toBe(`hold «PARAMETER» q to q ${rest}`);
  expect(system("hold alkalinity |")).toBe(`hold PARAMETER «q» to q ${rest}`);
  expect(system("hold alkalinity 7.8 t|o 8.6 dKH")).toBe(`hold PARAMETER q «to» q ${rest}`);
  expect(system("hold alkalinity 7.8 to |")).toBe(`hold PARAMETER q to «q» ${rest}`);
  expect(system("hold alkalinity 7.8 to 8.6 dKH |")).toBe(`hold PARAMETER q to q «[aim q]» ${dates}`);
  expect(system("hold alkalinity 7.8 to 8.6 dKH aim 8.2|")).toBe(`hold PARAMETER q to q «[aim q]» ${dates}`);
  expect(system("hold alkalinity 7.8 to 8.6 dKH from 2026-10-01 |")).toBe(
    "hold PARAMETER q to q [aim q] [from DATE [TIME]] «[until DATE [TIME]]»",
  );
  expect(system("hold alka|linity 7.8 to 8.6 dKH aim 8.2")).toBe(`hold «PARAMETER» q to q ${rest}`);
  const which = "(rise | fall | swing | dose | max | min)";
  expect(system("limit alkalinity |")).toBe(`limit PARAMETER «${which}» q ${dates}`);
  expect(system("limit alkalinity ri|")).toBe(`limit PARAMETER «${which}» q ${dates}`);
  expect(system("limit alkalinity rise 0.5 |")).toBe(`limit PARAMETER ${which} «q» ${dates}`);
});

test("cohort and pump", () => {
  const rest = `[each] [magnesium q] [grows q] ${dates}`;
  expect(system("cohort plugs |")).toBe(`cohort NAME «N» (pieces | unit) uptake q ${rest}`);
  expect(system("cohort plugs 30 |")).toBe(`cohort NAME N «(pieces | unit)» uptake q ${rest}`);
  expect(system("cohort plugs 0.6 m2 |")).toBe(`cohort NAME N (pieces | unit) «uptake» q ${rest}`);
  expect(system("cohort plugs 30 pieces uptake |")).toBe(`cohort NAME N (pieces | unit) uptake «q» ${rest}`);
  expect(system("cohort plugs 30 pieces uptake 5 meq/day each |")).toBe(
    `cohort NAME N (pieces | unit) uptake q [each] «[magnesium q]» [grows q] ${dates}`,
  );
  const parts = `[least q] [between TIME and TIME] [always q] [holding q] ${dates}`;
  expect(system("pump head |")).toBe(`pump NAME «gives» SOLUTION at q ${parts}`);
  expect(system("pump head gives |")).toBe(`pump NAME gives «SOLUTION» at q ${parts}`);
  expect(system("pump head gives soda at 40 |")).toBe(`pump NAME gives SOLUTION at «q» ${parts}`);
  expect(system("pump head gives soda at 40 mL/min hol|ding 5 L")).toBe(
    `pump NAME gives SOLUTION at q [least q] [between TIME and TIME] [always q] «[holding q]» ${dates}`,
  );
  expect(system("pump head gives soda at 40 mL/min holding 5 L between 08:00 |")).toBe(
    `pump NAME gives SOLUTION at q [least q] «[between TIME and TIME]» [always q] [holding q] ${dates}`,
  );
});

test("lists begin again behind a comma", () => {
  const rest = '[with KIT] [disregard "text"] [by WHO]';
  const read = "DATE [TIME] read";
  expect(logged("read |")).toBe(`${read} «PARAMETER» [below] q, … ${rest}`);
  expect(logged("read alkalinity |")).toBe(`${read} PARAMETER [below] «q, …» ${rest}`);
  expect(logged("read alkalinity 8 dKH,|")).toBe(`${read} «PARAMETER» [below] q, … ${rest}`);
  expect(logged("read alkalinity 8 dKH, calcium |")).toBe(`${read} PARAMETER [below] «q, …» ${rest}`);
  expect(logged("read alkalinity 8 dKH, calcium bel|")).toBe(`${read} PARAMETER «[below]» q, … ${rest}`);
  expect(logged("read alkalinity 8 dKH, calcium 420 |")).toBe(`${read} PARAMETER [below] «q, …» ${rest}`);
  expect(logged("read alkalinity 8 dKH, calcium 420 mg/L with |")).toBe(
    `${read} PARAMETER [below] q, … «[with KIT]» [disregard "text"] [by WHO]`,
  );
  expect(logged("set head-1 20 mL/day, |")).toBe("DATE [TIME] set «NAME» q, … [by WHO]");
  expect(logged("set head-1 20 mL/day, head-2 |")).toBe("DATE [TIME] set NAME «q, …» [by WHO]");
  expect(logged("gave soda 20 mL |")).toBe("DATE [TIME] gave NAME q, … «[by WHO]»");
});

test("other statements", () => {
  expect(logged("renewed 150 L |")).toBe("DATE [TIME] renewed volume «with» WATER [by WHO]");
  expect(logged("renewed 150 L with |")).toBe("DATE [TIME] renewed volume with «WATER» [by WHO]");
  expect(marked("log vat\n  2026-1|2-01 08:00 read alkalinity")).toMatch(/^«DATE» \[TIME\] read/);
  expect(marked("solution a\n  dissolve |")).toBe(`dissolve «REAGENT» mass ${dates}`);
  expect(marked("solution a\n  dissolve soda 3 |")).toBe(`dissolve REAGENT «mass» ${dates}`);
  expect(marked("solution a\n  make |")).toBe(`make «up» to volume ${dates}`);
  expect(marked("solution a\n  make up to |")).toBe(`make up to «volume» ${dates}`);
  const received = 'DATE [TIME] received REAGENT mass [lot "text"] [by WHO]';
  expect(marked("store\n  2026-12-01 received drum |")).toBe(received.replace("mass", "«mass»"));
  expect(marked('store\n  2026-12-01 received drum 3 kg lot "K-|')).toBe(
    received.replace('[lot "text"]', '«[lot "text"]»'),
  );
  const checked = 'DATE [TIME] checked PARAMETER q against q [lot "text"] [by WHO]';
  expect(marked("kit a\n  2026-12-01 checked alkalinity 8 dKH |")).toBe(
    checked.replace("against", "«against»"),
  );
  expect(marked("kit a\n  2026-12-01 checked alkalinity 8 dKH against |")).toBe(
    checked.replace("against q", "against «q»"),
  );
  expect(marked("kit a\n  alkalinity |")).toBe(`PARAMETER «(scatter | tolerance)» q ${dates}`);
  expect(system("measured volume |")).toBe(`measured volume «q» ${dates}`);
  expect(marked("system |")).toBe('system «NAME» ["title"]');
});

test("where no statement is, there is no help", () => {
  expect(system("|")).toBeNull();
  expect(system("note # hold |")).toBeNull();
  expect(marked("log vat\n  hold alkalinity |")).toBeNull();
  expect(system("holt |")).toBeNull();
  // A full form marks nothing.
  expect(marked("store|")).toBe("«store»");
  expect(marked("store |")).toBe("store");
});

test("its documentation is the meaning and the example that is most alike", () => {
  const { farm, cursor } = cursorIn("system vat\n  limit calcium fall |");
  expect(signatureHelp(farm, cursor)!.markdown).toBe(
    "What a parameter may do: change of the daily mean (rise, fall), swing within a day, rise at one dose, max, min.\n\n```marl\nlimit calcium fall 15 mg/L/day\n```",
  );
});
