/** `use` lines that lead to no file, out of the farm, or back. */
import { nearestWords } from "../../grammar/nearest.ts";
import type { Files } from "../culture/names.ts";
import { replacing } from "./fixing.ts";
import { pathTo } from "./name.ts";
import type { Of, Rules } from "./rule.ts";
import { inQuotes, oneOf } from "./words.ts";

/** Paths of the farm's files, from this one, that are a slip away from the one written. */
const nearPaths = ({ place, path }: Of<"use/missing-file">, files: Files): readonly string[] =>
  nearestWords(
    path,
    [...files.keys()].filter((file) => file !== place.file).map((file) => pathTo(place.file, file)),
  );

export const useRules: Rules<"use/missing-file" | "use/outside" | "use/cycle"> = {
  "use/missing-file": {
    severity: "error",
    title: "A used file that isn't there",
    says: ({ path }) => `There is no file ${inQuotes(path)} here.`,
    why: "The names that it declares are unknown in this file.",
    todo: "Check the path, which counts from the folder of this file.",
    todoHere: (finding, files) => {
      const near = nearPaths(finding, files);
      return near.length > 0
        ? `Is ${oneOf(near)} meant?`
        : "Check the path, which counts from the folder of this file.";
    },
    fixes: (finding, files) =>
      nearPaths(finding, files).flatMap((path) => replacing(finding.place, `"${path}"`, false)),
    example: {
      fires: 'use "solution.marl"\n\nsystem vat\n  tank main 500 L\n',
      silent:
        'use "solutions.marl"\n\nsystem vat\n  tank main 500 L\n  by-hand ash-part\n// file: solutions.marl\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n',
    },
  },
  "use/outside": {
    severity: "error",
    title: "A used file outside the farm's folder",
    says: ({ path }) => `${inQuotes(path)} leads out of the farm's folder.`,
    why: "Only what lies in that folder is read, so that every shift sees the same farm.",
    todo: "Move or copy the file into the farm's folder, and use it from there.",
    example: {
      fires: 'use "../solutions.marl"\n\nsystem vat\n  tank main 500 L\n',
      silent:
        'use "shared/solutions.marl"\n\nsystem vat\n  tank main 500 L\n  by-hand ash-part\n// file: shared/solutions.marl\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n',
    },
  },
  "use/cycle": {
    severity: "info",
    title: "Files that use each other",
    says: ({ path }) => `${inQuotes(path)} leads back to this file.`,
    why: "That does no harm: each sees the names of the other.",
    todo: "Nothing needs to be done.",
    example: {
      fires:
        'use "solutions.marl"\n\nsystem vat\n  tank main 500 L\n  by-hand ash-part\n// file: solutions.marl\nuse "farm.marl"\n\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n',
      silent:
        'use "solutions.marl"\n\nsystem vat\n  tank main 500 L\n  by-hand ash-part\n// file: solutions.marl\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n',
    },
  },
};
