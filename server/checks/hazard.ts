/** What is dangerous to handle. */
import { hazardStatements, hazards } from "../chemistry/hazards.ts";
import { reagents } from "../chemistry/reagents.ts";
import type { Files } from "../culture/names.ts";
import type { LineFix } from "./problem.ts";
import type { Of, Rules } from "./rule.ts";
import { linesAtEnd, sectionAt } from "./sections.ts";
import { allOf } from "./words.ts";

type Caustic = Of<"hazard/caustic">;

/** `soda-sack (Na2CO3)`. */
const substance = ({ word, reagent }: Caustic): string => `${word} (${reagents[reagent].formula})`;

function says(finding: Caustic): string {
  const hazard = hazards[finding.reagent];
  if (finding.who !== null || !hazard) return `${substance(finding)} is caustic.`;
  const does = allOf(hazard.statements.map((code) => hazardStatements[code]));
  const codes = [...hazard.statements, hazard.signal ?? ""].filter((word) => word !== "").join(", ");
  return `${substance(finding)} is caustic: it ${does} (GHS ${codes}).`;
}

const heats = {
  strong: "It heats the water so strongly that it can boil and spurt.",
  some: "It heats the water as it dissolves.",
  little: "Its dust and its strong solution are what hurts.",
} as const;

const whyHere = ({ reagent, who }: Caustic): string =>
  who === null
    ? heats[hazards[reagent]?.heat ?? "little"]
    : `Who may handle it: "${who}"${/[.?]$/.test(who) ? "" : "."}`;

export const causticGear = "Wear goggles and gloves";
/** The usual precautions where something caustic is handled. */
export const causticPrecautions = `${causticGear}; put the reagent slowly into cold stirred water, never water onto it; use a plastic vessel, never aluminium or zinc; keep acid away; rinse a splash 15 minutes with water and get medical help.`;
export const sheetComesFirst = "The supplier's safety data sheet and local rules come first.";

function acknowledging({ place, who }: Caustic, files: Files): readonly LineFix[] {
  const document = files.get(place.file);
  const section = sectionAt(files, place);
  if (who !== null || !document || section?.kind !== "solution") return [];
  const edits = [linesAtEnd(document, place.file, section, ['acknowledge caustic "say who may handle it"'])];
  return [{ title: "Acknowledge: say who may handle it", safe: false, edits }];
}

const lye = (lines: string): string =>
  `system vat\n  tank main 500 L\n  by-hand part\n\nsolution part\n${lines}  make up to 2 L\n`;

export const hazardRules: Rules<"hazard/caustic"> = {
  "hazard/caustic": {
    severity: ({ who }) => (who === null ? "warning" : "info"),
    severityInWords: "warning; info where the solution has an `acknowledge caustic` line",
    title: "A caustic reagent",
    says,
    why: "Caustics hurt eyes and skin, as dust, as a solution and as spray; sodium hydroxide and calcium oxide heat the water so strongly that it can boil and spurt.",
    whyHere,
    todo: `${causticPrecautions} ${sheetComesFirst}`,
    todoHere: ({ who }) => (who === null ? `${causticPrecautions} ${sheetComesFirst}` : sheetComesFirst),
    fixes: acknowledging,
    background: [
      'Told at each line that dissolves a sodium carbonate, sodium hydroxide, calcium hydroxide or calcium oxide, under whatever name of the farm. With `acknowledge caustic "who may handle it"` in the solution\'s section one quiet line stays.',
      "Statements are those of the GHS for the reagent as it is sold: sodium hydroxide and calcium chloride as in CLP Annex VI and suppliers' safety data sheets, calcium hydroxide and oxide as in a compiled safety data sheet, sodium carbonate from memory. A weak solution may be classified lower.",
      "Sodium hydroxide can boil locally and spurt as it dissolves, and is to be added to water with constant stirring, never water to it (OECD SIDS 2002, as the ECHA dossier quotes it); the same for calcium oxide, and hydrogen from hydroxide on aluminium, from memory. The other precautions are common practice without a source.",
    ].join("\n\n"),
    example: {
      fires: lye("  dissolve sodium-hydroxide 80 g\n"),
      silent: lye("  dissolve sodium-bicarbonate 80 g\n"),
    },
  },
};
