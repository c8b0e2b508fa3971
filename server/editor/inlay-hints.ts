/** Hints behind the words of a line: what follows from it and isn't written. Lines that don't read have none. */
import { minutesPerDay } from "../../grammar/dates.ts";
import { type ParameterName, parameterOf } from "../../grammar/parameters.ts";
import type { Statement } from "../../grammar/syntax.ts";
import { changeFigure, edgeFigure, figure, rounded, valueFigure } from "../checks/figures.ts";
import { endOfWords } from "../checks/fixing.ts";
import { defaults } from "../culture/defaults.ts";
import { shownIn } from "../culture/display.ts";
import { countUpTo } from "../culture/event-order.ts";
import { type Entry, factAt } from "../culture/history.ts";
import type { ReadEvent, Strength } from "../culture/model.ts";
import { nearestKnown, type Seen, seenIn } from "../culture/readings.ts";
import { judgeSalinity } from "../dosing/salinity-cause.ts";
import { uptakeAt } from "../dosing/uptake.ts";
import type { Farm } from "../farm.ts";
import { type LineInFarm, lineIn } from "./cursor.ts";
import { systemOfLine } from "./things.ts";

export type HintKind = "volume" | "uptake" | "strength" | "atSalinityAim";

export interface Hint {
  readonly kind: HintKind;
  readonly line: number;
  /** The end of the line's words, before its comment. */
  readonly column: number;
  readonly text: string;
  /** What it is, in a sentence. */
  readonly tooltip: string;
}

type Told = Pick<Hint, "text" | "tooltip">;
type Of<Kind extends Statement["kind"]> = Extract<Statement, { kind: Kind }>;

interface HintRow {
  readonly on: Statement["kind"];
  readonly tell: (farm: Farm, line: LineInFarm, statement: never, seen: SeenReadings) => Told | null;
}

/** Each kind of hint, and the statement that it stands behind. */
export const hintTable: Readonly<Record<HintKind, HintRow>> = {
  volume: { on: "tank", tell: volumeHint },
  uptake: { on: "cohort", tell: uptakeHint },
  strength: { on: "make-up", tell: strengthHint },
  atSalinityAim: { on: "read", tell: salinityHint },
};

/** The hints of these kinds from one line to another, both included. */
export function inlayHints(
  farm: Farm,
  file: string,
  first: number,
  last: number,
  kinds: ReadonlySet<HintKind>,
): Hint[] {
  const rows = (Object.entries(hintTable) as [HintKind, HintRow][]).filter(([kind]) => kinds.has(kind));
  const end = Math.min(last, (farm.documents.get(file)?.lines.length ?? 0) - 1);
  const hints: Hint[] = [];
  const seen = seenReadings(farm);
  for (let number = Math.max(first, 0); number <= end; number += 1) {
    const line = lineIn(farm, file, number);
    const statement = line?.line.statement;
    if (!line || !statement) continue;
    for (const [kind, { on, tell }] of rows) {
      const told = statement.kind === on ? tell(farm, line, statement as never, seen) : null;
      if (told) hints.push({ kind, line: number, column: endOfWords(line.line), ...told });
    }
  }
  return hints;
}

/** The entry that this very line made, of all that are known of a thing. */
const entryOf = <T>(
  history: readonly Entry<T>[] | undefined,
  { file, number }: LineInFarm,
): Entry<T> | null => history?.find(({ place }) => place.file === file && place.line === number) ?? null;

function volumeHint(farm: Farm, line: LineInFarm, { name, size, times }: Of<"tank">): Told | null {
  const entry = entryOf(systemOfLine(farm, line)?.facts.tanks.get(name.text), line);
  // A volume in litres says it itself.
  if (!entry || (size.shape === "volume" && !times && size.volume.unit?.text === "L")) return null;
  const text = `= ${figure(entry.value, "L")}`;
  const tooltip =
    size.shape === "volume"
      ? `The volume of ${name.text} in litres${times ? ", of all of them" : ""}.`
      : `The water in ${name.text} by its measures${times ? ", in all of them" : ""}; what displaces water is taken off the system's volume.`;
  return { text, tooltip };
}

function uptakeHint(farm: Farm, line: LineInFarm, { name }: Of<"cohort">): Told | null {
  const system = systemOfLine(farm, line);
  const assessment = system && farm.assessments.get(system.ref);
  const history = system?.facts.cohorts.get(name.text);
  const entry = entryOf(history, line);
  const litres = assessment?.volume.litres ?? null;
  if (!assessment || !history || !entry || litres === null) return null;
  const { at, state, constants } = assessment;
  // Of a cohort that is declared anew, only the line in force says what is taken.
  if (factAt(history, at) !== entry) return null;
  const alone = { cohorts: new Map([[name.text, history]]), uptakes: new Map(), proteinGPerDay: [] };
  const facts = { ...constants.facts, ...alone };
  const meqPerDay = uptakeAt(facts, state, at, litres, constants.firstEvent).perDay.alkalinity;
  if (meqPerDay === null) return null;
  const unit = shownIn(constants.facts, "alkalinity", at);
  const text = `${changeFigure("alkalinity", meqPerDay / litres, unit)}/day`;
  const tooltip = `The alkalinity that ${name.text} takes from the ${figure(litres, "L")} of ${system.name} a day, as the cohort is now: ${rounded(meqPerDay, meqPerDay < 9.95 ? 1 : 0)} meq.`;
  return { text, tooltip };
}

function strengthHint(farm: Farm, line: LineInFarm): Told | null {
  const { section, file } = line;
  const name = section?.kind === "solution" ? section.name?.text : undefined;
  const found = name === undefined ? undefined : farm.bound.names.visible.get(file)?.get(name);
  const strengths = found && farm.bound.model.solutions.get(found.ref)?.strengths;
  const own =
    strengths?.filter(({ place }) => place.file === file && place.line === section?.headerLine) ?? [];
  const entry = factAt(own, farm.moment.at) ?? own.at(-1);
  const text = entry ? strengthText(entry.value) : null;
  return text === null ? null : { text: `= ${text}`, tooltip: `What a millilitre of ${name} holds.` };
}

const shownOf = [
  ["alkalinityMeq", "alkalinity", "meq/mL"],
  ["calciumMg", "calcium", "mg/mL"],
  ["magnesiumMg", "magnesium", "mg/mL"],
  ["potassiumMg", "potassium", "mg/mL"],
  ["strontiumMg", "strontium", "mg/mL"],
] as const satisfies readonly (readonly [keyof Strength, ParameterName, string])[];

/** `alkalinity 1.51 meq/mL`, with what else can be dosed for; null where nothing of it is known. */
export function strengthText(strength: Strength): string | null {
  const parts = shownOf.flatMap(([field, name, unit]) => {
    const value = strength[field];
    return value !== null && value > 0 ? [`${name} ${threeDigits(value)} ${unit}`] : [];
  });
  return parts.length > 0 ? parts.join(", ") : null;
}

/** A weighed recipe is known to three digits at best. */
const threeDigits = (value: number): string =>
  rounded(value, Math.min(6, Math.max(0, 2 - Math.floor(Math.log10(value)))));

/** Dissolved values at the salinity aim, where salinity was out of its hold at the time. */
function salinityHint(farm: Farm, line: LineInFarm, _: Of<"read">, seen: SeenReadings): Told | null {
  const system = systemOfLine(farm, line);
  const readings = system && seen(system.ref);
  const event = readings?.events.get(`${line.number} ${line.file}`);
  if (!system || !readings || !event || event.disregarded) return null;
  const hold = factAt(system.facts.holds.get("salinity"), event.minute)?.value;
  const salinity = hold ? nearestTo(readings, event, "salinity") : null;
  if (!hold || salinity === null) return null;
  const temperatureDegC = nearestTo(readings, event, "temperature") ?? defaults.temperature.value;
  const scaled = Object.entries(event.values).flatMap(([name, read]) => {
    const row = parameterOf(name);
    const isDissolved = row?.measure === "alkalinity" || row?.measure === "dissolved";
    if (!row || !isDissolved || read.below || read.impossible) return [];
    const judged = judgeSalinity(read.value, noBand, salinity, hold, temperatureDegC);
    return judged ? [`${name} ${valueFigure(row.name, judged.scaled, read.unit)}`] : [];
  });
  if (scaled.length === 0) return null;
  const aim = edgeFigure("salinity", hold.aim, bare);
  return {
    text: `at salinity ${aim}: ${scaled.join(", ")}`,
    tooltip: `Salinity was ${edgeFigure("salinity", salinity, bare)}, out of its hold. At its aim of ${aim} this water would show these values.`,
  };
}

const bare = { spelling: "", perModelUnit: 1 };
/** What the value is judged against isn't asked here. */
const noBand = { low: 0, high: 0, aim: 0 };

/** A system's readings, by line and file, and what was read of salinity and temperature; looked up once. */
interface Readings {
  readonly events: ReadonlyMap<string, ReadEvent>;
  readonly salinity: readonly Seen[];
  readonly temperature: readonly Seen[];
}
type SeenReadings = (ref: string) => Readings;

function seenReadings(farm: Farm): SeenReadings {
  const known = new Map<string, Readings>();
  return (ref) => {
    const found = known.get(ref);
    if (found) return found;
    const events = farm.assessments.get(ref)?.readings.map(({ event }) => event) ?? [];
    const made: Readings = {
      events: new Map(events.map((event) => [`${event.place.line} ${event.place.file}`, event])),
      salinity: seenIn(events, "salinity"),
      temperature: seenIn(events, "temperature"),
    };
    known.set(ref, made);
    return made;
  };
}

/** A value read with the event or within a day of it; null where there is none. */
function nearestTo(readings: Readings, event: ReadEvent, name: "salinity" | "temperature"): number | null {
  const own = event.values[name];
  if (own && !own.below && !own.impossible) return own.value;
  const seen = readings[name];
  const { minute } = event;
  const near = seen.slice(
    countUpTo(seen, minute - minutesPerDay - 1),
    countUpTo(seen, minute + minutesPerDay),
  );
  const found = nearestKnown(near, minute, Number.NaN);
  return found.from === "reading" ? found.value : null;
}
