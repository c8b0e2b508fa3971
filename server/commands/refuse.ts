import type { Outlet, Status } from "./command.ts";

/** Says on standard error why a command can't be done; its status is 2, and standard output stays empty. */
export function refuse(outlet: Outlet, reason: string): Status {
  outlet.error(`marl: ${reason}\n`);
  return 2;
}
