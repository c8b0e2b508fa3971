/** What the command line says of itself, made from the commands' own tables. */
import { type Command, type OptionRow, optionsOf } from "./command.ts";

const optionLine = ([name, { value, about }]: [string, OptionRow]): string =>
  `  ${`--${name}${value ? ` ${value}` : ""}`.padEnd(22)}${about}`;

export const helpFor = (command: Command): string =>
  [
    command.form,
    "",
    `  ${command.about}`,
    "",
    ...Object.entries(optionsOf(command)).map(optionLine),
    "",
  ].join("\n");

export const help = (commands: readonly Command[]): string =>
  [
    "marl reads the farm's files and says what the water is, where it goes and what to dose.",
    "",
    ...commands.flatMap(({ form, about }) => [`  ${form}`, `      ${about}`]),
    "",
    "  marl COMMAND --help    the options of a command",
    "  marl --version",
    "",
    "Ends with 0 where all is well, 1 where the farm has an error, 2 where the words or a path can't be read.",
    "",
  ].join("\n");
