/** Records a reading: value by value, a look at the line, then one line in the log. */
import { type Memento, window } from "vscode";
import {
  marlRequest,
  type ReadingAnswer,
  type ReadingParams,
  type Refusal,
  type UsualReadingAnswer,
} from "../server/protocol/requests.ts";
import { askValue } from "./ask-value.ts";
import { type Named, systemHere } from "./here.ts";
import {
  type Draft,
  itemChoices,
  lastChoices,
  lastQuestion,
  promptFor,
  type Step,
  said,
  whatChoices,
} from "./reading-words.ts";
import type { Server } from "./server.ts";
import { writeEdit } from "./write-edit.ts";

/** Who recorded the last reading here: most of the time it is the same person again. */
const lastPerson = "lastPerson";

type Values = ReadingParams["values"];

export async function recordReading(server: Server, memory: Memento, named: Named): Promise<void> {
  const here = await systemHere(server, named);
  const usual = here && (await server.ask<UsualReadingAnswer>(marlRequest.usualReading, here));
  if (!here || !usual) return;
  const title = `Record a reading: ${here.name}`;
  const what = await askWhat(usual, title);
  if (!what) return;
  const ask = (values: Values, draft: Draft) =>
    server.ask<ReadingAnswer | Refusal>(marlRequest.readingEdit, { ...here, ...draft, values });
  const draft: Draft = { kit: what.kit, by: memory.get<string>(lastPerson) ?? null, moment: usual.now };
  const values = await askValues(usual, what.parameters, title, (some) => ask(some, draft));
  if (!values) return;
  if (values.length === 0) {
    void window.showInformationMessage("No value was given, so nothing is written.");
    return;
  }
  const chosen = await askLast(usual, draft, title, (last) => ask(values, last));
  if (!chosen) return;
  if (chosen.draft.by !== null) await memory.update(lastPerson, chosen.draft.by);
  await writeEdit(server, chosen.answer);
}

interface Chosen {
  readonly parameters: readonly string[];
  readonly kit: string | null;
}

async function askWhat(usual: UsualReadingAnswer, title: string): Promise<Chosen | undefined> {
  const options = { title, ignoreFocusOut: true };
  if (usual.usual.length > 0) {
    const what = await window.showQuickPick(whatChoices(usual), {
      ...options,
      placeHolder: "What was read?",
    });
    if (!what) return undefined;
    if (what.value !== null) return what.value;
  }
  const picked = await window.showQuickPick(itemChoices(usual), {
    ...options,
    canPickMany: true,
    placeHolder: "Tick what was read",
  });
  return picked && picked.length > 0
    ? { parameters: picked.map(({ value }) => value), kit: null }
    : undefined;
}

type Ask<T> = (given: T) => Promise<ReadingAnswer | Refusal | null>;

/** One box a parameter; back goes to the one before. Those left empty are left out. */
async function askValues(
  { items }: UsualReadingAnswer,
  parameters: readonly string[],
  title: string,
  ask: Ask<Values>,
): Promise<Values | undefined> {
  const texts = parameters.map(() => "");
  const given = (): Values =>
    parameters.flatMap((parameter, index) =>
      texts[index]!.trim() ? [{ parameter, text: texts[index]! }] : [],
    );
  for (let index = 0; index < parameters.length; ) {
    const item = items.find(({ parameter }) => parameter === parameters[index])!;
    const answer = await askValue({
      title,
      step: index + 1,
      of: parameters.length,
      prompt: promptFor(item),
      placeholder: item.last?.text ?? item.unit,
      value: texts[index]!,
      tell: async (text) => {
        texts[index] = text;
        const reply = await ask(given());
        return reply && said(reply);
      },
    });
    if (answer === undefined) return undefined;
    if (answer !== "back") texts[index] = answer.value;
    index += answer === "back" ? -1 : 1;
  }
  return given();
}

/** Until the line is to be written: kit, person and time can be changed. */
async function askLast(usual: UsualReadingAnswer, first: Draft, title: string, ask: Ask<Draft>) {
  let draft = first;
  for (;;) {
    const answer = await ask(draft);
    if (!answer) return undefined;
    const chosen = await window.showQuickPick(lastChoices(draft, answer, usual.kits.length > 0), {
      title,
      ignoreFocusOut: true,
      placeHolder: lastQuestion(answer),
    });
    if (!chosen) return undefined;
    if (chosen.value === "write") return "refusal" in answer ? undefined : { draft, answer };
    draft = { ...draft, ...(await change[chosen.value](usual, draft, title)) };
  }
}

const noKit = "no kit";

/** Each gives what changes; nothing where it was given up. */
const change: Readonly<
  Record<
    Exclude<Step, "write">,
    (usual: UsualReadingAnswer, draft: Draft, title: string) => Promise<Partial<Draft>>
  >
> = {
  kit: async ({ kits }, _draft, title) => {
    const kit = await window.showQuickPick([...kits, noKit], { title, placeHolder: "Tested with" });
    return kit === undefined ? {} : { kit: kit === noKit ? null : kit };
  },
  by: async ({ people }, { by }, title) => {
    const prompt = people.length > 0 ? `Who read it? So far: ${people.join(", ")}` : "Who read it?";
    const name = await window.showInputBox({ title, prompt, value: by ?? people[0] ?? "" });
    return name === undefined ? {} : { by: name.trim() || null };
  },
  moment: async (_usual, { moment }, title) => {
    const prompt = "When was it read? A time of today, or a date and a time";
    const at = await window.showInputBox({ title, prompt, value: moment });
    return at === undefined ? {} : { moment: at.trim() || moment };
  },
};
