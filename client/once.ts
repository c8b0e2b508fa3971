/** What is asked for many times within a moment is done once. No VS Code in here. */

/** After so much rest, ms: a keystroke is answered before the next, a paste only once. */
const rest = 100;

export interface Once {
  readonly soon: () => void;
  readonly dispose: () => void;
}

export function once(work: () => void): Once {
  let timer: ReturnType<typeof setTimeout> | undefined;
  return {
    soon: () => {
      clearTimeout(timer);
      timer = setTimeout(work, rest);
    },
    dispose: () => clearTimeout(timer),
  };
}
