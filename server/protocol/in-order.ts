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
  "marl/nowhere": new ResponseError(ErrorCodes.InvalidParams, "The parameters name no place in a document."),
} as const;

/** Requests that ask about one place. */
const atAPlace = new Set(
  ["hover", "completion", "signatureHelp", "definition", "references", "documentHighlight"]
    .concat("prepareRename", "rename", "onTypeFormatting")
    .map((name) => `textDocument/${name}`),
);

/** True where a request about a place names none. */
function isNowhere(method: string, params: unknown): boolean {
  if (!atAPlace.has(method)) return false;
  const { textDocument, position } = (params ?? {}) as {
    readonly textDocument?: { readonly uri?: unknown };
    readonly position?: { readonly line?: unknown; readonly character?: unknown };
  };
  if (typeof textDocument?.uri !== "string") return true;
  return !(Number.isInteger(position?.line) && Number.isInteger(position?.character));
}

/** What of a request stands against its being answered now. */
function refusalOf(phase: Phase, method: string, params: unknown): keyof typeof refusals | null {
  if (phase === "new") return method === "initialize" ? null : "marl/tooEarly";
  if (phase === "ended") return "marl/tooLate";
  if (method === "initialize") return "marl/again";
  return isNowhere(method, params) ? "marl/nowhere" : null;
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
            const refusal = refusalOf(phase, message.method, message.params);
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
