/**
 * The shapes that reading a line gives: spans, words, quantities as written, statements, and what a line got
 * wrong. Shapes only; nothing here reads, converts or judges.
 */

/** A place inside one line: UTF-16 offsets from the line's first character, end exclusive. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

/** A word as written. */
export interface Word extends Span {
  readonly text: string;
}

/** Digits in plain form: `-` for every minus sign, a point for decimals, nothing else. */
export interface NumberWord extends Span {
  readonly text: string;
}

/** A unit in the table's spelling where the table knows it, else as written without spaces. */
export interface UnitWord extends Span {
  readonly text: string;
}

/** A number with its unit, as written. */
export interface QuantityText extends Span {
  readonly number: NumberWord;
  /** Null where the number stands bare. */
  readonly unit: UnitWord | null;
  /** True where the unit was taken from another number of the line (`hold`, `tank`). */
  readonly borrowedUnit: boolean;
  /** Where `as CaCO3` stands, if it does. */
  readonly asCaCO3: Span | null;
  /** What follows `±`; a unit of `%` makes it a share of the number, null takes the number's own unit. */
  readonly uncertainty: (Span & { readonly number: NumberWord; readonly unit: UnitWord | null }) | null;
}

/** A wall-clock moment as written. */
export interface Moment extends Span {
  /** Minutes since 1970-01-01 00:00 of the wall clock. A bare date in an event means noon, elsewhere 00:00. */
  readonly minute: number;
  readonly timeKnown: boolean;
}

/** A time of day in minutes after midnight, 0 to 1440. */
export interface ClockTime extends Span {
  readonly minute: number;
}

/** The hours of a day from one time to another; may run over midnight. */
export interface Hours {
  readonly from: ClockTime;
  readonly to: ClockTime;
}

export const sectionKinds = ["system", "log", "solution", "reagent", "store", "saltwater", "kit"] as const;
export type SectionKind = (typeof sectionKinds)[number];

/** When a standing fact holds. */
export interface Standing {
  readonly from: Moment | null;
  readonly until: Moment | null;
}

/** When an event was and who did it. */
export interface Dated {
  readonly at: Moment;
  readonly by: Word | null;
}

export type TankSize =
  | {
      readonly shape: "box";
      readonly length: QuantityText;
      readonly width: QuantityText;
      readonly depth: QuantityText;
    }
  | { readonly shape: "round" | "cone"; readonly diameter: QuantityText; readonly depth: QuantityText }
  | { readonly shape: "volume"; readonly volume: QuantityText };

/** How many corals: pieces, or an area that they cover. */
export type StockCount =
  | { readonly by: "pieces"; readonly number: NumberWord }
  | { readonly by: "area"; readonly area: QuantityText };

export type LimitKind = "rise" | "fall" | "swing" | "dose" | "max" | "min";

export interface ReadItem extends Span {
  readonly parameter: Word;
  readonly below: boolean;
  readonly value: QuantityText;
}

export interface NamedQuantity extends Span {
  readonly name: Word;
  readonly quantity: QuantityText;
}

export interface Header {
  readonly kind: "header";
  readonly section: SectionKind;
  /** Null for `store`, and where the name is missing. */
  readonly name: Word | null;
  readonly title: Word | null;
  /** From when this recipe counts (`solution` only). */
  readonly from: Moment | null;
}

export interface Use {
  readonly kind: "use";
  readonly path: Word;
}

export type SystemFact = Standing &
  (
    | {
        readonly kind: "tank";
        readonly name: Word;
        readonly size: TankSize;
        readonly times: NumberWord | null;
      }
    | {
        readonly kind: "displace";
        readonly name: Word;
        readonly amount: QuantityText;
        readonly density: QuantityText | null;
      }
    | { readonly kind: "measured"; readonly volume: QuantityText }
    | {
        readonly kind: "hold";
        readonly parameter: Word;
        readonly low: QuantityText;
        readonly high: QuantityText;
        readonly aim: QuantityText | null;
      }
    | {
        readonly kind: "limit";
        readonly parameter: Word;
        readonly which: LimitKind;
        readonly value: QuantityText;
      }
    | {
        readonly kind: "cohort";
        readonly name: Word;
        readonly count: StockCount;
        readonly uptake: QuantityText;
        readonly each: boolean;
        readonly magnesium: QuantityText | null;
        readonly grows: QuantityText | null;
      }
    | { readonly kind: "uptake"; readonly parameter: Word; readonly value: QuantityText }
    | { readonly kind: "skeleton"; readonly magnesium: QuantityText }
    | { readonly kind: "air"; readonly carbonDioxide: QuantityText }
    | { readonly kind: "light"; readonly hours: Hours }
    | { readonly kind: "evaporates"; readonly volume: QuantityText }
    | { readonly kind: "feeds"; readonly food: QuantityText; readonly protein: QuantityText }
    | { readonly kind: "top-off"; readonly solution: Word | null; readonly volume: QuantityText }
    | { readonly kind: "flows-through"; readonly volume: QuantityText; readonly water: Word }
    | {
        readonly kind: "pump";
        readonly name: Word;
        readonly solution: Word;
        readonly flow: QuantityText;
        readonly least: QuantityText | null;
        readonly hours: Hours | null;
        readonly always: QuantityText | null;
        readonly holding: QuantityText | null;
      }
    | {
        readonly kind: "by-hand";
        readonly solution: Word;
        readonly times: NumberWord | null;
        readonly always: QuantityText | null;
      }
  );

export type SolutionFact = Standing &
  (
    | { readonly kind: "dissolve"; readonly reagent: Word; readonly mass: QuantityText }
    | { readonly kind: "saturated"; readonly reagent: Word }
    | { readonly kind: "make-up"; readonly volume: QuantityText }
    | { readonly kind: "keep"; readonly temperature: QuantityText }
    | {
        readonly kind: "supplies";
        readonly parameter: Word;
        readonly strength: QuantityText;
        readonly as: "carbonate" | "bicarbonate" | "hydroxide" | null;
      }
    | { readonly kind: "acknowledge"; readonly who: Word }
  );

export type ReagentFact = Standing &
  (
    | { readonly kind: "is"; readonly reagent: Word; readonly purity: QuantityText | null }
    | { readonly kind: "formula"; readonly formula: Word; readonly purity: QuantityText | null }
    | { readonly kind: "reorder-below"; readonly mass: QuantityText }
    | { readonly kind: "lead"; readonly time: QuantityText }
  );

export type WaterFact = Standing & {
  readonly kind: "value";
  readonly parameter: Word;
  readonly value: QuantityText;
};

export type KitFact = Standing & {
  readonly kind: "scatter" | "tolerance";
  readonly parameter: Word;
  readonly value: QuantityText;
};

export type StandingNote = Standing & { readonly kind: "note"; readonly text: Word };

export type LogEvent = Dated &
  (
    | {
        readonly kind: "read";
        readonly items: readonly ReadItem[];
        readonly kit: Word | null;
        readonly disregard: Word | null;
      }
    | { readonly kind: "set" | "gave"; readonly items: readonly NamedQuantity[] }
    | { readonly kind: "renewed"; readonly volume: QuantityText; readonly water: Word }
    | { readonly kind: "topped"; readonly volume: QuantityText; readonly solution: Word | null }
    | { readonly kind: "stocked" | "removed"; readonly cohort: Word; readonly count: StockCount }
    | { readonly kind: "moved"; readonly cohort: Word; readonly count: StockCount; readonly system: Word }
    | { readonly kind: "filled" | "level"; readonly pump: Word; readonly volume: QuantityText }
    | {
        readonly kind: "calibrated";
        readonly pump: Word;
        readonly volume: QuantityText;
        readonly time: QuantityText;
      }
    | { readonly kind: "stopped" | "started"; readonly pump: Word }
    | { readonly kind: "note"; readonly text: Word }
  );

export type StoreEvent = Dated &
  (
    | {
        readonly kind: "received";
        readonly reagent: Word;
        readonly mass: QuantityText;
        readonly lot: Word | null;
      }
    | { readonly kind: "counted"; readonly reagent: Word; readonly mass: QuantityText }
    | { readonly kind: "mixed" | "discarded"; readonly solution: Word; readonly volume: QuantityText }
  );

export type KitEvent = Dated & {
  readonly kind: "checked";
  readonly parameter: Word;
  readonly value: QuantityText;
  readonly against: QuantityText;
  readonly lot: Word | null;
};

export type Fact = SystemFact | SolutionFact | ReagentFact | WaterFact | KitFact | StandingNote;
export type Event = LogEvent | StoreEvent | KitEvent;
export type Statement = Header | Use | Fact | Event;

/** What a line got wrong, in our own words' raw material. `checks/` makes the sentence. */
export type LineFinding = { readonly span: Span } & (
  | {
      readonly code: "syntax/unknown-word";
      readonly word: string;
      /** What could have stood there, in the language's own words: keywords, or `a parameter`, `a unit`, `a name`. */
      readonly expected: readonly string[];
      /** The nearest known words, best first; often one, empty where none is near. */
      readonly nearest: readonly string[];
    }
  | { readonly code: "syntax/unfinished"; readonly expected: readonly string[] }
  /** `readings`: the plain forms that the word may have meant. */
  | { readonly code: "syntax/number-form"; readonly word: string; readonly readings: readonly string[] }
  | { readonly code: "syntax/date-form"; readonly word: string; readonly readings: readonly string[] }
  | {
      readonly code: "syntax/misplaced";
      readonly word: string;
      /** In which section this statement belongs; empty where it is in its section but stands wrongly (indentation, repeated part). */
      readonly belongs: readonly SectionKind[];
      readonly why:
        | "section"
        | "margin"
        | "repeated"
        | "keyword-as-name"
        | "dated"
        | "undated"
        | "no-section"
        | "order";
      /** What could have stood there instead, where that is known. */
      readonly expected?: readonly string[];
    }
  | { readonly code: "syntax/merge-marks" }
  /** Left unread: no line of a person is so long. */
  | { readonly code: "syntax/too-long" }
);
