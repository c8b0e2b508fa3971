/** Messages in the order that the protocol asks for: what comes before `initialize` or after `shutdown` is refused. */
import {
  type Connection,
  type ConnectionOptions,
  ErrorCodes,
  Message,
  ResponseError,
} from "vscode-languageserver/node";

type Phase = "new" | "running" | "ended";

const refusals = {
  "marl/tooEarly": new ResponseError(ErrorCodes.ServerNotInitialized, "The first request is `initialize`."),
  "marl/again": new ResponseError(ErrorCodes.InvalidRequest, "This server is initialized already."),
  "marl/tooLate": new ResponseError(ErrorCodes.InvalidRequest, "This server has been shut down."),
} as const;

/** What of a request stands against its being answered now. */
function refusalOf(phase: Phase, method: string): keyof typeof refusals | null {
  if (phase === "new") return method === "initialize" ? null : "marl/tooEarly";
  if (phase === "ended") return "marl/tooLate";
  return method === "initialize" ? "marl/again" : null;
}

export interface InOrder {
  /** Lets through what comes in order. */
  readonly options: ConnectionOptions;
  /** Answers what doesn't. */
  readonly refuse: (to: Connection) => void;
  /** True once the client has asked for `shutdown`. */
  readonly hasEnded: () => boolean;
}

export function inOrder(): InOrder {
  let phase: Phase = "new";
  return {
    options: {
      messageStrategy: {
        handleMessage: (message, next) => {
          if (Message.isRequest(message)) {
            const refusal = refusalOf(phase, message.method);
            if (refusal === null && message.method === "initialize") phase = "running";
            if (refusal === null && message.method === "shutdown") phase = "ended";
            return next(refusal === null ? message : ({ ...message, method: refusal } as typeof message));
          }
          if (Message.isNotification(message) && phase !== "running" && message.method !== "exit") return;
          return next(message);
        },
      },
    },
    hasEnded: () => phase === "ended",
    refuse: (to) => {
      for (const [method, refusal] of Object.entries(refusals)) to.onRequest(method, () => refusal);
    },
  };
}
