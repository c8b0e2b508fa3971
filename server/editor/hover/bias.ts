/** How far off a kit was when it was last checked, as its `checked` lines say. */
import { type Parameter, type ParameterName, parameterOf } from "../../../grammar/parameters.ts";
import type { QuantityText, Statement } from "../../../grammar/syntax.ts";
import { changeFigure } from "../../checks/figures.ts";
import { inModelUnit } from "../../culture/convert.ts";
import type { DisplayUnit, Kit } from "../../culture/model.ts";
import type { Farm } from "../../farm.ts";
import { asValue, readConcentration } from "../../quantity/concentration.ts";
import { dayAndMonth } from "../../report/latest.ts";

type Checked = Extract<Statement, { kind: "checked" }>;

export interface Bias {
  readonly parameter: ParameterName;
  /** What was found less what was known, in the model's unit; a test reads too high where it is positive. */
  readonly off: number;
  readonly known: number;
  readonly minute: number;
}

/** What one check found; null where it can't be read. */
export function biasFound({ parameter: word, value, against, at }: Checked): Bias | null {
  const parameter = parameterOf(word.text);
  if (!parameter) return null;
  const [found, known] = [inModel(value, parameter), inModel(against, parameter)];
  if (found === null || known === null) return null;
  return { parameter: parameter.name, off: found - known, known, minute: at.minute };
}

function inModel(quantity: QuantityText, parameter: Parameter): number | null {
  const read = readConcentration(quantity, parameter, asValue);
  return read.ok ? inModelUnit(read.value.amount, parameter, () => 1) : null;
}

/** Of each parameter the last check up to a moment, where it found the kit off. */
export function biasOf(farm: Farm, { place }: Kit, until: number): Bias[] {
  const document = farm.documents.get(place.file);
  const own = document?.lines[place.line]?.section ?? null;
  const last = new Map<ParameterName, Bias>();
  for (const { section, statement } of document?.lines.slice(place.line) ?? []) {
    const bias = section === own && statement?.kind === "checked" ? biasFound(statement) : null;
    const before = bias && last.get(bias.parameter);
    if (bias && bias.minute <= until && (!before || before.minute <= bias.minute))
      last.set(bias.parameter, bias);
  }
  return [...last.values()].filter(({ off }) => off !== 0);
}

/** `bench read alkalinity 0.20 dKH too high when it was checked 2 Nov; estimates don't take that off yet.` */
export const biasText = (kit: string, { parameter, off, minute }: Bias, unit: DisplayUnit): string =>
  `${kit} read ${parameter} ${changeFigure(parameter, Math.abs(off), unit)} too ${off > 0 ? "high" : "low"} when it was checked on ${dayAndMonth(minute)}; that isn't taken off in any estimate yet.`;
