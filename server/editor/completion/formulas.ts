/** Formulas of the reagents that are built in. */
import { reagents } from "../../chemistry/reagents.ts";
import type { Offer } from "./item.ts";
import type { CompletionPlace } from "./place.ts";

export const formulaOffers = ({ expected, words }: CompletionPlace): Offer[] =>
  words.length > 0 && expected.includes("a formula")
    ? Object.entries(reagents).map(([word, { title, formula }]) => ({
        ...{ kind: "formula", label: formula, detail: title, about: { kind: "reagent", word } },
      }))
    : [];
