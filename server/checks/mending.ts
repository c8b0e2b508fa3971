/** Lines of a log that would mend what is wrong with the water or a dose: written now, split, or set aside. */
import { writeDate, writeMoment } from "../../grammar/dates.ts";
import type { ParameterName } from "../../grammar/parameters.ts";
import type { Event } from "../../grammar/syntax.ts";
import { writeStatement } from "../../grammar/write.ts";
import type { DisplayUnit } from "../culture/model.ts";
import type { Files } from "../culture/names.ts";
import type { Place } from "../culture/place.ts";
import type { Exchange, Remedies, Split } from "../dosing/remedy.ts";
import { Decimal34 } from "../quantity/decimal.ts";
import { figureWithin, plannedFigure, valueFigure } from "./figures.ts";
import { endOfWords, lineAt } from "./fixing.ts";
import type { LineEdit, LineFix } from "./problem.ts";
import { intoLog, lastUpTo, linesAfter, sectionAt, sees } from "./sections.ts";
import { allOf, nameOf } from "./words.ts";

/** More fixes of one problem than these nobody reads. */
export const mostFixes = 6;
const mostWaters = 3;
/** Longer, a line wouldn't fit the screen. */
const longestLine = 90;

const dated = (minute: number): string => writeMoment(minute).replace("T", " ");

interface InWater {
  readonly system: string;
  readonly parameter: ParameterName;
  readonly unit: DisplayUnit;
  readonly remedies?: Remedies;
}

/** What is to be written into the log now: rates, doses by hand, exchanged water. */
export function writtenNow({ system, parameter, unit, remedies }: InWater, files: Files): readonly LineFix[] {
  if (!remedies) return [];
  return [
    ...ratesSet(system, remedies, files),
    ...givenNow(system, remedies, files),
    ...exchanged(system, parameter, unit, remedies, files),
  ];
}

/** The `set` line with every source of the plan that is set to something else; a hand only where it is set at all. */
export function ratesSet(system: string, remedies: Remedies, files: Files): readonly LineFix[] {
  const { at, newest } = remedies;
  const items = remedies.set.flatMap(({ name, litresPerDay, setLPerDay, isLimited }) => {
    const amount = plannedFigure(litresPerDay, isLimited);
    return amount === plannedFigure(setLPerDay, false) ? [] : [{ name, amount: `${amount}/day` }];
  });
  const here = alreadySet(system, remedies, files);
  const changed = items.flatMap(({ name, amount }): LineEdit[] => {
    const edit = here.get(name);
    return edit ? [{ ...edit, text: amount }] : [];
  });
  const texts = setLines(
    at,
    items.filter(({ name }) => !here.has(name)).map(({ name, amount }) => `${name} ${amount}`),
  );
  const added = texts.length > 0 ? intoLog(files, system, newest, at, texts) : null;
  const edits = added ? [...changed, added] : texts.length > 0 ? [] : changed;
  if (edits.length === 0) return [];
  const said = items.map(({ name, amount }) => `${name} to ${amount}`);
  const more = said.length > 3 ? [...said.slice(0, 2), `${said.length - 2} more`] : said;
  return [{ title: `Set ${allOf(more)} from now on`, safe: false, edits }];
}

/** Where this very minute's lines set a pump already: a second line could lose against them. */
function alreadySet(system: string, { at, newest }: Remedies, files: Files): ReadonlyMap<string, LineEdit> {
  const found = new Map<string, LineEdit>();
  const section = newest && sectionAt(files, newest);
  const document = newest && files.get(newest.file);
  if (!section || !document || section.kind !== "log" || section.name?.text !== system) return found;
  for (let line = lastUpTo(document, section, at); line > section.headerLine; line -= 1) {
    const statement = document.lines[line]!.statement;
    if (statement && "at" in statement && statement.at.minute < at) break;
    if (statement?.kind !== "set" || statement.at.minute !== at) continue;
    for (const { name, quantity } of statement.items) {
      const { start, end } = quantity;
      if (!found.has(name.text)) found.set(name.text, { file: newest.file, line, start, end, text: "" });
    }
  }
  return found;
}

/** One line, or one a pump where it would be too long. */
function setLines(minute: number, items: readonly string[]): string[] {
  const line = (some: readonly string[]) => `${dated(minute)} set ${some.join(", ")}`;
  if (items.length === 0) return [];
  return line(items).length <= longestLine ? [line(items)] : items.map((item) => line([item]));
}

/** Today's doses by hand, for who gives them now. */
function givenNow(system: string, { at, newest, gave }: Remedies, files: Files): readonly LineFix[] {
  return gave.slice(0, 2).flatMap(({ solution, litres, isLimited }): LineFix[] => {
    const amount = plannedFigure(litres, isLimited);
    const words = `gave ${nameOf(solution)} ${amount}`;
    const edit = intoLog(files, system, newest, at, [`${dated(at)} ${words}`]);
    return edit ? [{ title: `Write ${words} (today's dose by hand)`, safe: false, edits: [edit] }] : [];
  });
}

/** What a day's limits have to say of an exchange. */
function besideLimits({ within, limits }: Exchange): string {
  if (within === "limits") return "";
  const named =
    limits.length > 1
      ? `a day's limits on ${allOf(limits)} allow`
      : `a day's limit on ${allOf(limits)} allows`;
  return within === "day" ? `, as far as ${named}` : `, more at once than ${named}`;
}

/** What else an exchange brings to another value, as people see it. */
function otherMoves({ moves }: Exchange): string[] {
  return moves.flatMap(({ parameter, unit, from, to }) => {
    const reached = valueFigure(parameter, to, unit);
    return reached === valueFigure(parameter, from, unit) ? [] : [`${parameter} to ${reached}`];
  });
}

function exchanged(
  system: string,
  parameter: ParameterName,
  unit: DisplayUnit,
  { at, newest, exchanges }: Remedies,
  files: Files,
): readonly LineFix[] {
  const waters = new Set<string>();
  return exchanges.flatMap((exchange): LineFix[] => {
    const { water, litres, reached, within } = exchange;
    const way = within === "day" ? "down" : "up";
    const volume = litres < 100 ? tenths(litres, way) : figureWithin(litres, "L", way);
    const words = `renewed ${volume} with ${nameOf(water)}`;
    const edit = intoLog(files, system, newest, at, [`${dated(at)} ${words}`]);
    if (!edit || !sees(files, edit.file, "saltwater", water) || Number.parseFloat(volume) === 0) return [];
    waters.add(water);
    if (waters.size > mostWaters) return [];
    const values = [`${parameter} to ${valueFigure(parameter, reached, unit)}`, ...otherMoves(exchange)];
    const brings = `brings ${allOf(values)}${besideLimits(exchange)}`;
    return [{ title: `Write ${words} (${brings})`, safe: false, edits: [edit] }];
  });
}

/** Litres with one decimal where it says something. */
function tenths(litres: number, way: "down" | "up"): string {
  const number = (way === "down" ? Math.floor(litres * 10 + 1e-6) : Math.ceil(litres * 10 - 1e-6)) / 10;
  return `${Number(number.toFixed(1))} L`;
}

/** The parts of a dose on lines of their own, each at its place in the log. */
export function doseSplit(
  { place, split }: { readonly place: Place; readonly split: Split | null },
  files: Files,
): readonly LineFix[] {
  const document = files.get(place.file);
  const section = sectionAt(files, place);
  const statement = lineAt(files, place)?.statement;
  if (!split || !document || !section || statement?.kind !== "gave") return [];
  const { at, by, items } = statement;
  const item = items.find(({ start }) => start === place.span?.start);
  if (!item || (split.over === "day" && !at.timeKnown)) return [];
  const { number, unit } = item.quantity;
  const shares = split.parts.map(({ share }) => share);
  const amounts = partsOf(number.text, shares);
  if (!amounts) return [];
  const [first = ""] = amounts;
  const after = new Map<number, string[]>();
  for (const [index, { minute }] of split.parts.entries()) {
    if (index === 0) continue;
    const date = at.timeKnown ? dated(minute) : writeDate(minute);
    const words = [date, "gave", item.name.text, amounts[index], unit?.text, by && `by ${by.text}`];
    const line = Math.max(lastUpTo(document, section, minute), place.line);
    after.set(line, [...(after.get(line) ?? []), words.filter(Boolean).join(" ")]);
  }
  const edits: LineEdit[] = [
    { file: place.file, line: place.line, start: number.start, end: number.end, text: first },
    ...[...after].map(([line, texts]) => linesAfter(document, place.file, line, false, texts)),
  ];
  const each = [...new Set(amounts)];
  const of =
    each.length === 1 ? `${first} ${unit?.text ?? ""} each` : `${allOf(amounts)} ${unit?.text ?? ""}`;
  const over =
    split.over === "day" ? `into ${amounts.length} doses over the day` : `over ${amounts.length} days`;
  const title = `Split ${over}, ${of} (if it isn't given yet; the later lines wait for their time)`;
  return [{ title, safe: false, edits }];
}

/** The last part takes the rest: no more than so much above its share, or it could break the limit. */
const mostAbove = 1.004;
const mostDecimals = 6;

/** An amount in parts that add up to it to the last digit, with digits enough for half a per cent. */
function partsOf(written: string, shares: readonly number[]): string[] | null {
  const whole = decimalOf(written);
  if (!whole) return null;
  const smallest = whole.toNumber() * Math.min(...shares);
  const fewest = Math.min(Math.max(Math.ceil(-Math.log10(smallest * 0.005)), 0), mostDecimals);
  for (let decimals = fewest; decimals <= mostDecimals; decimals += 1) {
    const parts = shares
      .slice(0, -1)
      .map((share) => whole.times(share).plus(1e-6).toDecimalPlaces(decimals, Decimal34.ROUND_DOWN));
    const rest = parts.reduce((left, part) => left.minus(part), whole);
    if (rest.greaterThan(whole.times((shares.at(-1) ?? 0) * mostAbove)) && decimals < mostDecimals) continue;
    const all = [...parts, rest];
    return all.every((part) => part.greaterThan(0)) ? all.map((part) => part.toFixed()) : null;
  }
  return null;
}

function decimalOf(written: string): Decimal34 | null {
  const isNumber = Number.isFinite(Number(written)) && Number(written) > 0;
  return isNumber ? new Decimal34(written) : null;
}

/** Sets a line of readings aside, with the reason left to say; the line is written tidily, its comment kept. */
export function disregarding(place: Place, files: Files): readonly LineFix[] {
  const line = lineAt(files, place);
  const statement = line?.statement;
  if (!line || statement?.kind !== "read" || statement.disregard) return [];
  const disregard = { text: "say why", start: 0, end: 0 };
  const text = writeStatement({ ...statement, disregard } as Event);
  const start = line.text.length - line.text.trimStart().length;
  const edits = [{ file: place.file, line: place.line, start, end: endOfWords(line), text }];
  return [{ title: "Disregard this line: say why", safe: false, edits }];
}
