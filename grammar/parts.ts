/**
 * The table of words that stand inside statements: what each adds to its line. In which statements they stand is
 * the parser's own grammar, and the lines that show them are the statement table's.
 */
import { keywordsIn } from "./expected.ts";
import { parser } from "./line.ts";
import { type StatementRow, statementTable } from "./statements.ts";
import type { Keyword } from "./tokens.ts";

export interface PartRow {
  readonly word: Keyword | "x" | "±" | "as CaCO3";
  readonly meaning: string;
}

const part = (word: PartRow["word"], meaning: string): PartRow => ({ word, meaning });

export const partTable: readonly PartRow[] = [
  part("from", "From when a standing line counts; without it, it has always counted."),
  part("until", "Until when a standing line counts; that moment itself is left out."),
  part("by", "Who did it: a name or initials, at the end of an event."),
  part("±", "How far the number may be off, in its own unit or in %; one standard deviation."),
  part("as CaCO3", "The number counts calcium carbonate, as many kits print it."),
  part("x", "Between the sides of a tank, with spaces round it; × is read too."),
  part("round", "A round tank: its diameter, then the depth of the water."),
  part("cone", "A cone that stands on its tip: its diameter at the water, then the depth of the water."),
  part("times", "How many of one kind: tanks of one size, or hand doses a day."),
  part("volume", "Says that it is the system's volume that was measured."),
  part("at", "Comes before a density, a temperature or a flow."),
  part(
    "to",
    "Between the two ends of a band, or before the level that a container is filled to or the system that corals go to.",
  ),
  part("aim", "The value to steer for; without it, the middle of the band."),
  part("rise", "How far the mean of a day may go up from one day to the next."),
  part("fall", "How far the mean of a day may go down from one day to the next."),
  part("swing", "Highest less lowest within a day, the planned trend taken off."),
  part("dose", "How far one delivery may raise the parameter."),
  part("max", "Never above this."),
  part("min", "Never below this."),
  part("pieces", "Counts corals; instead of it an area may stand."),
  part("uptake", "What the cohort takes, as alkalinity or as calcium carbonate laid down."),
  part("each", "The uptake is that of one piece, not of all."),
  part("magnesium", "Mole fraction of magnesium in the mineral that is laid down."),
  part("grows", "How much more the cohort takes with time."),
  part("CO2", "Carbon dioxide of the room's air, as a share of dry air or as a pressure."),
  part("between", "Comes before the two ends of the hours."),
  part("and", "Between the two ends of the hours; they may run over midnight."),
  part("protein", "The share of protein in the food."),
  part("with", "Comes before the water, the solution or the kit that was used."),
  part("gives", "Comes before the solution that a pump gives."),
  part("least", "The smallest dose that the pump repeats well."),
  part("always", "A fixed rate that always runs and that the plan works around."),
  part("holding", "The volume of the pump's own container when full."),
  part("below", "The test showed less than this, the smallest that it can tell."),
  part(
    "disregard",
    "The readings of this line stay in the file and count in no estimate; the reason is in quotes.",
  ),
  part("in", "Comes before the time that a pump's volume was measured over."),
  part("up", "Belongs to make up to."),
  part("as", "Comes before what brings the alkalinity of a bought solution."),
  part("carbonate", "The alkalinity of a bought solution comes from carbonate."),
  part("bicarbonate", "The alkalinity of a bought solution comes from bicarbonate."),
  part("hydroxide", "The alkalinity of a bought solution comes from hydroxide."),
  part("caustic", "Says that it is the caution about a caustic solution that is known."),
  part("purity", "The share of the reagent in what is in the sack; without it, all of it."),
  part("lot", "The number printed on the sack or the bottle."),
  part("scatter", "One standard deviation of repeated tests of one sample."),
  part("tolerance", "What is printed on the kit; two standard deviations."),
  part("against", "Comes before the true value of what was tested."),
];

/** The statements that a word may stand inside. */
export const statementsWith = (word: PartRow["word"]): readonly StatementRow[] =>
  statementTable.filter((row) => row.word !== word && keywordsIn(parser(), row.rule).has(word));

/** Lines of the statement table that show a word, each with the kind of section that it stands in. */
export const linesWith = (
  word: PartRow["word"],
): readonly { readonly row: StatementRow; readonly line: string }[] =>
  statementsWith(word).flatMap((row) =>
    row.examples.filter((line) => showing(word, line)).map((line) => ({ row, line })),
  );

/** True where the line holds the word outside quotes, and not as its first. */
function showing(word: string, line: string): boolean {
  const words = line.replace(/"[^"]*"/g, '""');
  return words.includes(` ${word} `) || words.endsWith(` ${word}`);
}

const partByWord = new Map<string, PartRow>(partTable.map((row) => [row.word, row]));

export const partOf = (word: string): PartRow | undefined => partByWord.get(word);
