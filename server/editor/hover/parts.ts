/** What hovers are made of: lines of plain words, drawn as Markdown in one place, so that nothing goes out unescaped. */
import { minutesPerDay, writeMoment } from "../../../grammar/dates.ts";
import type { ParameterName } from "../../../grammar/parameters.ts";
import { changeFigure, decimalsOf, figure, valueFigure } from "../../checks/figures.ts";
import { dayText } from "../../checks/words.ts";
import { shownIn } from "../../culture/display.ts";
import { type Entry, factAt, type History } from "../../culture/history.ts";
import type { Assumption, DisplayUnit, FarmModel } from "../../culture/model.ts";
import type { Place } from "../../culture/place.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { Decimal34 } from "../../quantity/decimal.ts";
import { assumptionLines } from "../../report/assumption-lines.ts";
import { escaped, escapedInside, marlBlock, marlWords } from "../markdown.ts";

/** A line of plain words; the lead stands out where markup is drawn. */
export interface Line {
  readonly lead: string;
  readonly text: string;
}

export interface Told {
  /** The numbers that were asked for, at the top. */
  readonly answer: Line | string;
  /** Paragraphs of lines. */
  readonly blocks: readonly (readonly (Line | string)[])[];
  /** How the statement is written. */
  readonly form?: string | null;
  /** Lines of Marl, to be copied. */
  readonly marl?: readonly string[];
  readonly assumptions?: readonly Assumption[];
  /** Papers, shortly; a source given twice is told once. */
  readonly sources?: readonly string[];
}

export const led = (lead: string, text: string): Line => ({ lead, text });

const drawn = (line: Line | string): string =>
  typeof line === "string" ? escaped(line) : `**${escapedInside(line.lead)}** ${escapedInside(line.text)}`;

/** A paragraph whose lines break where they are told to. */
const paragraph = (lines: readonly string[]): string => lines.join("  \n");

/** The whole text. */
export function markdownOf(told: Told): string {
  const { answer, blocks, form, marl = [], assumptions = [], sources = [] } = told;
  const ending = [
    ...assumptionLines(distinct(assumptions)).map((line) => drawn(led("Assumed:", line))),
    ...(sources.length > 0 ? [drawn(led("After:", `${[...new Set(sources)].join("; ")}.`))] : []),
  ];
  const parts = [
    drawn(answer),
    ...blocks.filter((lines) => lines.length > 0).map((lines) => paragraph(lines.map(drawn))),
    ...(form ? [`${escaped("Written:")} ${marlWords(form)}`] : []),
    ...(marl.length > 0 ? [marlBlock(marl.join("\n"))] : []),
    ...(ending.length > 0 ? [paragraph(ending)] : []),
  ];
  return parts.join("\n\n");
}

const distinct = (list: readonly Assumption[]): Assumption[] => [
  ...new Map(list.map((each) => [`${each.what}\n${each.value}`, each])).values(),
];

/** Papers that results of the core rest on, in few words. */
export const papers = {
  carbonate:
    "Lueker et al. 2000, Dickson 1990 and Millero 1995 (constants), Mucci 1983 (Ω), Uppström 1974 (boron)",
  nbs: "Takahashi et al. 1982 (NBS scale)",
  density: "Millero and Poisson 1981 (density)",
  air: "Weiss and Price 1980 (CO2 of air)",
  calcification: "Smith and Key 1975, Chisholm and Gattuso 1991 (2 meq a mol of CaCO3)",
  nitrification: "Middelburg et al. 2020 (nitrification)",
  salinity: "PSS-78 (Perkin and Lewis 1980)",
  composition: "Millero et al. 2008 (sea water)",
  lime: "Bates et al. 1956 (limewater)",
  solubility: "CRC Handbook, 98th ed. (solubility)",
  alkalinity: "Wolf-Gladrow et al. 2007 (alkalinity of salts)",
} as const;

export const unitIn = ({ constants, at }: Assessment, name: ParameterName): DisplayUnit =>
  shownIn(constants.facts, name, at);

/** The unit beside a value of the water: of a pH its scale, where that isn't NBS. */
export const unitOn = (scale: "NBS" | "total" | null, unit: DisplayUnit): DisplayUnit =>
  scale === null ? unit : { spelling: scale === "total" ? "total" : "", perModelUnit: 1 };

/** How far apart two values are, at the digits of a value; one digit finer where that would show nothing. Null for none. */
export function distanceFigure(name: ParameterName, size: number, unit: DisplayUnit): string | null {
  const own = name === "pH" ? { ...unit, spelling: "" } : unit;
  const tells = (text: string) => /[1-9]/.test(text);
  const text = valueFigure(name, Math.abs(size), own);
  if (tells(text)) return text;
  if (decimalsOf(name, own) > 2) return null;
  const finer = changeFigure(name, Math.abs(size), own);
  const isSeen = Math.abs(size * own.perModelUnit) >= 0.5 * 10 ** -(decimalsOf(name, own) + 1);
  return isSeen ? finer : null;
}

/** A change with its sign: `+0.24 dKH`. */
export function signedChange(name: ParameterName, change: number, unit: DisplayUnit): string {
  const text = changeFigure(name, change, unit);
  return change > 0 && /[1-9]/.test(text) ? `+${text}` : text;
}

/** A number with so many digits that count, in plain decimals; zeros at its end only where they were found, not exact. */
export function digits(value: number, count: number): string {
  if (!Number.isFinite(value)) return "unknown";
  const short = new Decimal34(value).toSignificantDigits(count);
  const isExact = Math.abs(short.toNumber() - value) <= 1e-12 * Math.abs(value);
  return isExact ? short.toFixed() : short.toFixed(Math.max(0, count - 1 - short.e));
}

/** Digits that a strength or an amount is told with: what weighing and measuring up to a mark give. */
const amountDigits = 3;

/** `0.0025 dKH`, `1.57 meq`: an amount whose size can be anything. */
export const amount = (value: number, unit: string): string =>
  unit === "" ? digits(value, amountDigits) : `${digits(value, amountDigits)} ${unit}`;

/** A volume of water or solution, however large. */
export function volumeFigure(litres: number): string {
  if (Math.abs(litres) >= 1e6) return amount(litres, "L");
  return Math.abs(litres) < 1 ? figure(litres * 1000, "mL") : figure(litres, "L");
}

/** `35 %`; a small share keeps a digit that counts. */
export function percent(share: number): string {
  const value = 100 * share;
  return `${Number.isFinite(value) ? digits(value, Math.abs(value) >= 99.5 && Math.abs(value) < 100 ? 3 : 2) : "unknown"} %`;
}

/** A solution's name. */
export const solutionName = (model: FarmModel, ref: string): string =>
  model.solutions.get(ref)?.name ?? ref.split(" ")[0] ?? ref;

/** `24 Nov 08:10`. */
export function shortMoment(minute: number): string {
  const [, day = "", month = ""] = dayText(minute).split(" ");
  return `${day} ${month.slice(0, 3)} ${writeMoment(minute).slice(11)}`;
}

/** The same to the hour: what is foreseen pretends to no more. */
export const hourText = (minute: number): string => shortMoment(Math.round(minute / 60) * 60);

/** The entry that a line of the file made, else the one in force. */
export function entryHere<T>(history: History<T> | undefined, place: Place, at: number): Entry<T> | null {
  const here = history?.find(({ place: own }) => own.file === place.file && own.line === place.line);
  return here ?? factAt(history, at);
}

/** Says of an entry that it doesn't count now; nothing where it does. */
export function notNow<T>(entry: Entry<T>, history: History<T>, at: number): string[] {
  if (factAt(history, at) === entry) return [];
  const writtenDay = (minute: number) => writeMoment(minute).replace("T", " ");
  if (entry.from > at) return [`Counts from ${writtenDay(entry.from)} on, not yet.`];
  if (entry.until <= at) return [`Counted until ${writtenDay(entry.until)}.`];
  return ["A newer line counts instead of this one now."];
}

/** `in 3 days`, `5 days ago`, `today`. */
export function daysApart(minute: number, at: number): string {
  const days = Math.floor(minute / minutesPerDay) - Math.floor(at / minutesPerDay);
  if (days === 0) return "today";
  if (days === 1) return "tomorrow";
  if (days === -1) return "yesterday";
  return days > 0 ? `in ${days} days` : `${-days} days ago`;
}

/** How long something lasts that goes at a rate a day. */
export function lasting(litres: number, litresPerDay: number): string | null {
  if (!(litresPerDay > 0)) return null;
  const days = litres / litresPerDay;
  if (days >= 1000) return "more than 1000 days";
  return days < 1 ? `${digits(days * 24, 2)} h` : `${digits(days, 2)} days`;
}
