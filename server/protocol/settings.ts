/** The settings that an editor may give: one table, from which documentation and a manifest are made. */

export interface SettingRow<T extends boolean | number> {
  readonly value: T;
  readonly description: string;
  /** Of a number. */
  readonly least?: number;
  readonly most?: number;
}

export const settingsTable = {
  "problems.mostPerFile": {
    value: 200,
    least: 1,
    most: 100_000,
    description: "How many problems of one file are shown; one more says how many are left out.",
  },
  "hints.volume": { value: true, description: "Show the volume behind a tank's measures." },
  "hints.uptake": { value: true, description: "Show what a cohort takes from the water in a day." },
  "hints.strength": { value: true, description: "Show a recipe's strength behind its volume." },
  "hints.atSalinityAim": {
    value: true,
    description: "Show a reading at the salinity aim, where salinity is off it.",
  },
  "lenses.doses": { value: true, description: "Show today's doses above a system." },
  "lenses.reading": { value: true, description: "Offer to record a reading above a log." },
} as const satisfies Record<string, SettingRow<boolean | number>>;

export type SettingName = keyof typeof settingsTable;
export type Settings = {
  readonly [Name in SettingName]: (typeof settingsTable)[Name]["value"] extends boolean ? boolean : number;
};

/** What a client gave, as a tree or with points in its names; what is missing or no such value is the table's. */
export function settingsOf(given: unknown): Settings {
  const entries = Object.entries(settingsTable).map(([name, row]: [string, SettingRow<boolean | number>]) => {
    const value = valueAt(given, name);
    if (typeof row.value === "boolean") return [name, typeof value === "boolean" ? value : row.value];
    const fits = typeof value === "number" && value >= (row.least ?? 0) && value <= (row.most ?? value);
    return [name, fits ? Math.floor(value) : row.value];
  });
  return Object.fromEntries(entries) as Settings;
}

function valueAt(given: unknown, name: string): unknown {
  if (typeof given !== "object" || given === null) return undefined;
  const tree = given as Readonly<Record<string, unknown>>;
  if (name in tree) return tree[name];
  const [first = "", ...rest] = name.split(".");
  return rest.length > 0 ? valueAt(tree[first], rest.join(".")) : undefined;
}
