/** Statements that may begin here, by their fixed words; headers at the margin. */
import { aParameter, type StatementRow, statementTable } from "../../../grammar/statements.ts";
import { type Form, type FormPart, formsOf } from "../form-parts.ts";
import { type Offer, tabStop } from "./item.ts";
import type { CompletionPlace } from "./place.ts";

export function statementOffers(place: CompletionPlace): Offer[] {
  const { words, section, isDated, atMargin } = place;
  if (words.length > 0) return [];
  const form = isDated ? "event" : "fact";
  const rows = statementTable.filter((row) =>
    atMargin
      ? row.form === "header"
      : row.form === form && section !== null && row.sections.includes(section),
  );
  return rows.flatMap((row) => (row.word === aParameter ? [] : offersOf(row, place.isLast)));
}

function offersOf(row: StatementRow, isWhole: boolean): Offer[] {
  const forms = formsOf(row);
  const shared = {
    kind: "statement",
    detail: row.meaning,
    about: { kind: "statement", rule: row.rule },
  } as const;
  const label = beginningOf(forms.at(-1)!);
  // The rest of a line that goes on after the word is kept.
  if (!isWhole) return [{ ...shared, label: row.word, begins: true }];
  const plain = { ...shared, label, begins: mustGoOn(forms.at(-1)!) };
  if (forms.length === 1) return [{ ...plain, snippet: snippetOf(forms[0]!) }];
  // One for each way in which it may go on, the most general first.
  return [forms.at(-1)!, ...forms.slice(0, -1)].map((form, index) =>
    index === 0
      ? { ...plain, snippet: snippetOf(form) }
      : {
          ...plain,
          label: `${label} ${placeholdersOf(form)}`,
          text: label,
          filter: label,
          snippet: snippetOf(form),
        },
  );
}

/** The parts that a line of it can't be without, after its date. */
function needed({ parts }: Form): readonly FormPart[] {
  const first = parts.findIndex(({ kind }) => kind !== "date" && kind !== "optional");
  return parts.slice(first).filter(({ kind }) => kind !== "optional");
}

const mustGoOn = (form: Form): boolean => needed(form).some(({ kind }) => kind !== "word");

/** `make up to`, `hold`. */
function beginningOf(form: Form): string {
  const parts = needed(form);
  const end = parts.findIndex(({ kind }) => kind !== "word");
  return (end < 0 ? parts : parts.slice(0, end)).map(({ text }) => text).join(" ");
}

/** How a form that has several goes on. */
const placeholdersOf = (form: Form): string =>
  needed(form)
    .slice(1)
    .map(({ text }) => text)
    .join(" ");

/** What is filled in where nothing stands; a number is none, so that no value is left in the file that nobody meant. */
function snippetOf(form: Form): string {
  let stops = 0;
  const pieces = needed(form).map(({ kind, text, words }) => {
    if (kind === "word") return text;
    stops += 1;
    const plain = text.replace(/, …$/, "");
    if (kind === "text") return `"${tabStop(stops, [])}"`;
    if (kind === "choice") return tabStop(stops, words.includes("unit") ? [words[0]!] : words);
    return tabStop(stops, [plain]);
  });
  return stops === 0 ? pieces.join(" ") : `${pieces.join(" ")}$0`;
}

/** True where the section's lines begin with a parameter. */
export const beginsWithParameter = ({
  words,
  isDated,
  atMargin,
  section,
  expected,
}: CompletionPlace): boolean =>
  words.length === 0 && !isDated && !atMargin && section !== null && expected.includes(aParameter);
