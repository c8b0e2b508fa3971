/** `marl explain`: what a problem's code or a word of the language means. */
import { oneOf } from "../checks/words.ts";
import { topicText } from "../report/explain/text.ts";
import { nearTopics, topicsOf } from "../report/explain/topics.ts";
import { type Command, formatOf, sharedOptions } from "./command.ts";
import { refuse } from "./refuse.ts";

const { format, color } = sharedOptions;

export const explain: Command = {
  name: "explain",
  form: "marl explain CODE | WORD",
  about: "what a problem's code means, or a statement, parameter, unit or reagent of the language",
  looksAtNoFarm: true,
  options: { format, color },
  run: async (words, outlet) => {
    const asked = words.paths.join(" ").trim();
    if (asked === "")
      return refuse(outlet, "explain takes a code or a word, for example: marl explain water/stale");
    const face = formatOf(words);
    if (typeof face !== "string") return refuse(outlet, face.reason);
    const topics = topicsOf(asked);
    if (topics.length === 0) {
      const near = nearTopics(asked);
      return refuse(outlet, `nothing is known of ${asked}${near.length > 0 ? `; ${oneOf(near)}?` : ""}`);
    }
    outlet.out(
      face === "json"
        ? `${JSON.stringify({ word: asked, topics }, null, 2)}\n`
        : topicText(topics, outlet.color),
    );
    return 0;
  },
};
