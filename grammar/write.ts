/** Statement → its tidy text, without indent and comment: the one writer of lines. Digits are never changed. */
import { minutesPerDay, writeClock, writeDate } from "./dates.ts";
import type {
  Dated,
  Event,
  Fact,
  Header,
  Hours,
  Moment,
  NamedQuantity,
  QuantityText,
  ReadItem,
  Standing,
  Statement,
  StockCount,
  TankSize,
  Use,
  Word,
} from "./syntax.ts";

type Piece = string | null;

const join = (...pieces: readonly Piece[]): string =>
  pieces.filter((piece) => piece !== null && piece !== "").join(" ");
const quoted = (word: Word): string => `"${word.text}"`;
const titled = (word: Word | null): Piece => word && quoted(word);

const timeOfDay = (minute: number): number => ((minute % minutesPerDay) + minutesPerDay) % minutesPerDay;

/** A date, and its time where one was written. */
function moment(at: Moment): string {
  const date = writeDate(at.minute);
  return at.timeKnown ? `${date} ${writeClock(timeOfDay(at.minute))}` : date;
}

const hours = ({ from, to }: Hours): string =>
  `between ${writeClock(from.minute)} and ${writeClock(to.minute)}`;

/** A quantity as it is written, or with a borrowed unit written out. */
type WriteQuantity = (quantity: QuantityText) => string;

const writer =
  (withBorrowed: boolean): WriteQuantity =>
  ({ number, unit, borrowedUnit, asCaCO3, uncertainty, start, end }) => {
    const isOwn = withBorrowed || !borrowedUnit;
    const isOwnCalcite = asCaCO3 !== null && (isOwn || (asCaCO3.start >= start && asCaCO3.end <= end));
    return join(
      number.text,
      unit && isOwn ? unit.text : null,
      isOwnCalcite ? "as CaCO3" : null,
      uncertainty && join("±", uncertainty.number.text, uncertainty.unit?.text ?? null),
    );
  };

type Among<S, Kind> = S extends { kind: infer Kinds } ? (Kind extends Kinds ? S : never) : never;
type Of<Kind extends Statement["kind"]> = Among<Statement, Kind>;
/** What follows a line's first word and precedes `from` and `until`, or follows its date and precedes `by`. */
type Body = {
  readonly [Kind in (Fact | Event)["kind"]]: (
    statement: Of<Kind>,
    quantity: WriteQuantity,
  ) => readonly Piece[];
};

const count = (stock: StockCount, quantity: WriteQuantity): string =>
  stock.by === "pieces" ? `${stock.number.text} pieces` : quantity(stock.area);

function size(tank: TankSize, quantity: WriteQuantity): string {
  switch (tank.shape) {
    case "box":
      return `${quantity(tank.length)} x ${quantity(tank.width)} x ${quantity(tank.depth)}`;
    case "volume":
      return quantity(tank.volume);
    default:
      return `${tank.shape} ${quantity(tank.diameter)} x ${quantity(tank.depth)}`;
  }
}

const part = (word: string, quantity: WriteQuantity, value: QuantityText | null): Piece =>
  value && `${word} ${quantity(value)}`;
const reading = (item: ReadItem, quantity: WriteQuantity): string =>
  join(item.parameter.text, item.below ? "below" : null, quantity(item.value));
const named = (items: readonly NamedQuantity[], quantity: WriteQuantity): string =>
  items.map((item) => `${item.name.text} ${quantity(item.quantity)}`).join(", ");

const body: Body = {
  tank: (s, q) => ["tank", s.name.text, size(s.size, q), s.times && `times ${s.times.text}`],
  displace: (s, q) => ["displace", s.name.text, q(s.amount), part("at", q, s.density)],
  measured: (s, q) => ["measured volume", q(s.volume)],
  hold: (s, q) => ["hold", s.parameter.text, q(s.low), "to", q(s.high), part("aim", q, s.aim)],
  limit: (s, q) => ["limit", s.parameter.text, s.which, q(s.value)],
  cohort: (s, q) => [
    ...["cohort", s.name.text, count(s.count, q), "uptake", q(s.uptake)],
    ...[s.each ? "each" : null, part("magnesium", q, s.magnesium), part("grows", q, s.grows)],
  ],
  uptake: (s, q) => ["uptake", s.parameter.text, q(s.value)],
  skeleton: (s, q) => ["skeleton magnesium", q(s.magnesium)],
  air: (s, q) => ["air CO2", q(s.carbonDioxide)],
  light: (s) => ["light", hours(s.hours)],
  evaporates: (s, q) => ["evaporates", q(s.volume)],
  feeds: (s, q) => ["feeds", q(s.food), "protein", q(s.protein)],
  "top-off": (s, q) => ["top-off", s.solution?.text ?? null, q(s.volume)],
  "flows-through": (s, q) => ["flows-through", q(s.volume), "with", s.water.text],
  pump: (s, q) => [
    ...["pump", s.name.text, "gives", s.solution.text, "at", q(s.flow), part("least", q, s.least)],
    ...[s.hours && hours(s.hours), part("always", q, s.always), part("holding", q, s.holding)],
  ],
  "by-hand": (s, q) => [
    ...["by-hand", s.solution.text],
    ...[s.times && `times ${s.times.text}`, part("always", q, s.always)],
  ],
  dissolve: (s, q) => ["dissolve", s.reagent.text, q(s.mass)],
  saturated: (s) => ["saturated", s.reagent.text],
  "make-up": (s, q) => ["make up to", q(s.volume)],
  keep: (s, q) => ["keep at", q(s.temperature)],
  supplies: (s, q) => ["supplies", s.parameter.text, q(s.strength), s.as && `as ${s.as}`],
  acknowledge: (s) => ["acknowledge caustic", quoted(s.who)],
  is: (s, q) => ["is", s.reagent.text, part("purity", q, s.purity)],
  formula: (s, q) => ["formula", s.formula.text, part("purity", q, s.purity)],
  "reorder-below": (s, q) => ["reorder-below", q(s.mass)],
  lead: (s, q) => ["lead", q(s.time)],
  value: (s, q) => [s.parameter.text, q(s.value)],
  scatter: (s, q) => [s.parameter.text, "scatter", q(s.value)],
  tolerance: (s, q) => [s.parameter.text, "tolerance", q(s.value)],
  note: (s) => ["note", quoted(s.text)],
  read: (s, q) => [
    ...["read", s.items.map((item) => reading(item, q)).join(", ")],
    ...[s.kit && `with ${s.kit.text}`, s.disregard && `disregard ${quoted(s.disregard)}`],
  ],
  set: (s, q) => ["set", named(s.items, q)],
  gave: (s, q) => ["gave", named(s.items, q)],
  renewed: (s, q) => ["renewed", q(s.volume), "with", s.water.text],
  topped: (s, q) => ["topped", q(s.volume), s.solution && `with ${s.solution.text}`],
  stocked: (s, q) => ["stocked", s.cohort.text, count(s.count, q)],
  removed: (s, q) => ["removed", s.cohort.text, count(s.count, q)],
  moved: (s, q) => ["moved", s.cohort.text, count(s.count, q), "to", s.system.text],
  filled: (s, q) => ["filled", s.pump.text, "to", q(s.volume)],
  level: (s, q) => ["level", s.pump.text, q(s.volume)],
  calibrated: (s, q) => ["calibrated", s.pump.text, q(s.volume), "in", q(s.time)],
  stopped: (s) => ["stopped", s.pump.text],
  started: (s) => ["started", s.pump.text],
  received: (s, q) => ["received", s.reagent.text, q(s.mass), s.lot && `lot ${quoted(s.lot)}`],
  counted: (s, q) => ["counted", s.reagent.text, q(s.mass)],
  mixed: (s, q) => ["mixed", s.solution.text, q(s.volume)],
  discarded: (s, q) => ["discarded", s.solution.text, q(s.volume)],
  checked: (s, q) => [
    ...["checked", s.parameter.text, q(s.value), "against", q(s.against)],
    s.lot && `lot ${quoted(s.lot)}`,
  ],
};

const header = ({ section, name, title, from }: Header): string =>
  join(section, name?.text ?? null, from && `from ${moment(from)}`, titled(title));

function write(statement: Statement, quantity: WriteQuantity): string {
  if (statement.kind === "header") return header(statement);
  if (statement.kind === "use") return `use ${quoted((statement as Use).path)}`;
  const words = (body[statement.kind] as (s: Statement, q: WriteQuantity) => readonly Piece[])(
    statement,
    quantity,
  );
  if ("at" in statement) {
    const { at, by } = statement as Dated;
    return join(moment(at), ...words, by && `by ${by.text}`);
  }
  const { from, until } = statement as Standing;
  return join(...words, from && `from ${moment(from)}`, until && `until ${moment(until)}`);
}

const asWritten = writer(false);
const writtenOut = writer(true);

/** The tidy text of a statement. Reading it gives the same statement, apart from spans. */
export const writeStatement = (statement: Statement): string => write(statement, asWritten);

/** The units of a statement's quantities, as they are written. */
export function unitsIn(statement: Statement): readonly string[] {
  const units: string[] = [];
  write(statement, ({ unit, uncertainty }) => {
    if (unit) units.push(unit.text);
    if (uncertainty?.unit) units.push(uncertainty.unit.text);
    return "";
  });
  return units;
}

/**
 * What a statement says: the same for statements that mean the same, however they are spelt or spaced and whether
 * or not a unit was borrowed. Statements that mean different things never share one.
 */
export const summaryOf = (statement: Statement): string => write(statement, writtenOut);
