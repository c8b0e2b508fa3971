/** Hover: what the thing under the cursor is, and what the water says about it. */
import { statementTable } from "../../grammar/statements.ts";
import type { Span, Statement } from "../../grammar/syntax.ts";
import type { Farm } from "../farm.ts";
import type { Cursor, LineSpan } from "./cursor.ts";
import { cohortTold, stockTold } from "./hover/cohort.ts";
import { calibratedTold, containerTold } from "./hover/containers.ts";
import { gaveTold, setTold } from "./hover/dose.ts";
import { factsTold } from "./hover/facts.ts";
import { holdTold } from "./hover/hold.ts";
import { limitTold } from "./hover/limit.ts";
import { markdownOf, type Told } from "./hover/parts.ts";
import { pumpTold } from "./hover/pump.ts";
import { quantityTold, valueTold } from "./hover/quantity.ts";
import { readTold } from "./hover/reading.ts";
import { dissolveTold, reagentLineTold, reagentTold, saturatedTold } from "./hover/reagent.ts";
import { renewedTold } from "./hover/renewed.ts";
import {
  batchTold,
  checkedTold,
  kitTold,
  logTold,
  massTold,
  ofSolution,
  saltWaterTold,
  useTold,
} from "./hover/shelf.ts";
import { solutionTold } from "./hover/solution.ts";
import type { Spot, Tells } from "./hover/spot.ts";
import { systemTold } from "./hover/system.ts";
import { displacementTold, measuredTold, tankTold } from "./hover/tank.ts";
import { codeUnder, momentTold, parameterWord, rowOf, rowTold, wordTold } from "./hover/word.ts";
import { type Thing, thingOf } from "./things.ts";
import { type UnderCursor, underCursor } from "./under-cursor.ts";
import type { LineWord, ThingKind, WordRole } from "./words.ts";

export interface Hover {
  readonly span: LineSpan;
  readonly markdown: string;
}

/** What is told of the place under the cursor; null where there is nothing to tell. */
export function hover(farm: Farm, cursor: Cursor): Hover | null {
  const under = underCursor(farm, cursor);
  if (!under) return null;
  const { file, line } = cursor;
  const at = ({ start, end }: Span): LineSpan => ({ file, line, start, end });
  const code = codeUnder(under);
  if (code) return { span: at(code.span), markdown: markdownOf(code.told) };
  const { word } = under;
  const told = word && toldOf(farm, under, word);
  return told && { span: at(word), markdown: markdownOf(told) };
}

function toldOf(farm: Farm, under: UnderCursor, word: LineWord): Told | null {
  const { statement } = under.line.line;
  const section = under.line.section?.kind ?? null;
  if (word.role === "moment") return momentTold(word.text, farm.moment.at);
  if (!statement) return wordTold(word.text, section);
  const { file, line } = under.cursor;
  const spot: Spot = {
    farm,
    model: farm.bound.model,
    at: farm.moment.at,
    under,
    statement,
    place: { file, line, span: null },
    assessment: under.system ? (farm.assessments.get(under.system.ref) ?? null) : null,
  };
  return byRole[word.role]?.(spot, word) ?? null;
}

/** Of things with a name, by their kind. */
const byThing: Readonly<Record<ThingKind, Tells>> = {
  system: ({ farm, under }) => ofSystem(farm, under.thing),
  tank: tankTold,
  displacement: displacementTold,
  cohort: cohortTold,
  pump: pumpTold,
  solution: solutionTold,
  reagent: reagentTold,
  saltwater: saltWaterTold,
  kit: kitTold,
};

function ofSystem(farm: Farm, thing: Thing | null): Told | null {
  const assessment = farm.assessments.get(thing?.ref ?? "");
  return assessment ? systemTold(farm, assessment) : null;
}

/** Of the words that lines begin with, by the kind of line. */
const byStatement: Readonly<Partial<Record<Statement["kind"], Tells>>> = {
  use: useTold,
  tank: tankTold,
  displace: displacementTold,
  measured: measuredTold,
  hold: holdTold,
  limit: limitTold,
  cohort: cohortTold,
  pump: pumpTold,
  "by-hand": pumpTold,
  ...factsTold,
  dissolve: dissolveTold,
  saturated: saturatedTold,
  supplies: ofSolution,
  "make-up": ofSolution,
  keep: ofSolution,
  is: reagentLineTold,
  formula: reagentLineTold,
  value: valueTold,
  scatter: valueTold,
  tolerance: valueTold,
  checked: checkedTold,
  read: readTold,
  gave: gaveTold,
  topped: gaveTold,
  set: setTold,
  stopped: setTold,
  started: setTold,
  renewed: renewedTold,
  stocked: stockTold,
  removed: stockTold,
  moved: stockTold,
  filled: containerTold,
  level: containerTold,
  calibrated: calibratedTold,
  received: massTold,
  counted: massTold,
  mixed: batchTold,
  discarded: batchTold,
};

type TellsWord = (spot: Spot, word: LineWord) => Told | null;

/** The thing that a header is of. */
const ofHeader: Tells = (spot) => {
  const { statement, under, farm } = spot;
  if (statement.kind !== "header") return null;
  if (statement.section === "log") return logTold(spot);
  const name = under.words.find((word) => word.name !== null);
  const thing = name && thingOf(farm, under.line, name);
  return thing ? byThing[thing.kind]({ ...spot, under: { ...under, word: name, thing } }) : null;
};

const statementWords: ReadonlySet<string> = new Set(statementTable.map(({ word }) => word));

/** True for the word that the line begins with, a date before it left out. */
const isFirst = ({ words }: UnderCursor, { start }: LineWord): boolean =>
  words.find(({ role }) => role !== "moment")?.start === start;

/** What the line says of the water, and how such a line is written. */
const ofLine: Tells = (spot) =>
  spot.statement.kind === "header" ? ofHeader(spot) : (byStatement[spot.statement.kind]?.(spot) ?? null);

/** A word inside a line, with examples of such lines. */
function inside({ under }: Spot, word: string): Told | null {
  const first = under.words.find(({ role }) => role !== "moment")?.text ?? null;
  return wordTold(word, under.line.section?.kind ?? null, first);
}

const keywordTold: TellsWord = (spot, word) => {
  const { statement, under } = spot;
  const section = under.line.section?.kind ?? null;
  if (!isFirst(under, word) || !statementWords.has(word.text)) return inside(spot, word.text);
  const row = rowOf(statement, section, word.text);
  const told = ofLine(spot);
  if (!told) return row ? rowTold(row) : inside(spot, word.text);
  return row ? { ...told, form: rowTold(row).form ?? null } : told;
};

const parameterTold: TellsWord = (spot, word) =>
  ofLine(spot) ?? parameterWord(word.text, spot.under.line.section?.kind ?? null);

const quantityWord: TellsWord = (spot, word) =>
  (spot.statement.kind === "read" ? readTold(spot) : null) ??
  quantityTold(spot) ??
  (word.role === "unit" ? wordTold(word.text, null) : ofLine(spot));

const byRole: Readonly<Partial<Record<WordRole, TellsWord>>> = {
  keyword: keywordTold,
  parameter: parameterTold,
  name: (spot) => (spot.under.thing ? byThing[spot.under.thing.kind](spot) : null),
  number: quantityWord,
  unit: quantityWord,
  sign: (spot, word) => inside(spot, word.text),
  time: ofLine,
  path: useTold,
  formula: reagentLineTold,
};
