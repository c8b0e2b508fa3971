/**
 * Code actions. Their edits are worked out when one is chosen, where the client can wait for them; a client that knows
 * commands only gets those, and is asked to do the edit.
 */
import { isAbsolute } from "node:path";
import {
  ApplyWorkspaceEditRequest,
  type CancellationToken,
  type CodeAction,
  CodeActionTriggerKind,
  type Command,
  LSPErrorCodes,
  type Range,
  ResponseError,
  type ServerCapabilities,
  type WorkspaceEdit,
} from "vscode-languageserver/node";
import { type Action, actionKinds, actionsAt } from "../../editor/code-actions.ts";
import type { Client } from "../client.ts";
import { diagnosticOf } from "../problems.ts";
import { about, type Feature, type Session } from "../session.ts";
import { inTurns } from "../turns.ts";
import type { LookAt } from "../workspace.ts";

/** The command of a client that knows no actions. */
const applyAction = "marl.applyAction";

/** What finds an action again: where it was asked for, and which of the answers it was. */
interface Carried {
  readonly uri: string;
  readonly version: number | null;
  readonly range: Range;
  readonly only: readonly string[] | null;
  readonly place: number;
  readonly title: string;
}

/** Asked for by no person, an editor wants to know only what there is to do right here. */
const here: readonly string[] = ["quickfix", "refactor"];

function offers({ actionLiterals, actionResolves, appliesEdits }: Client): ServerCapabilities {
  if (actionLiterals)
    return {
      codeActionProvider: {
        codeActionKinds: [...actionKinds],
        resolveProvider: actionResolves.includes("edit"),
      },
    };
  if (!appliesEdits) return {};
  return { codeActionProvider: true, executeCommandProvider: { commands: [applyAction] } };
}

export const codeActionsFeature: Feature = {
  title: "Code actions",
  about:
    "fixes of a problem, and keeping it quiet; all safe fixes of a file; tidy it; a quantity in another unit; a section in another file; a log sorted, split by month, or with a `read` line dated now",
  offers,
  listen: (session) => {
    const { connection, client } = session;
    const canDo = client.actionLiterals || client.appliesEdits;
    connection.onCodeAction(({ textDocument: { uri }, range, context }, token) =>
      about(session, uri, token, async (look): Promise<(CodeAction | Command)[]> => {
        if (!canDo) return [];
        const isAutomatic = context.triggerKind === CodeActionTriggerKind.Automatic;
        const only = context.only ?? (isAutomatic ? here : null);
        const version = look.versionOf(look.file);
        const actions = await inTurns(found(session, look, range, only), token);
        const carried = { uri, version, range, only };
        return inTurns(allWritten(session, look, actions, carried), token);
      }),
    );
    if (client.actionLiterals && client.actionResolves.includes("edit"))
      connection.onCodeActionResolve(async (action, token) => {
        const edit = await editOf(session, action.data, token);
        return edit ? { ...action, edit } : action;
      });
    if (!client.actionLiterals && client.appliesEdits)
      connection.onExecuteCommand(async ({ command, arguments: [carried] = [] }, token) => {
        const edit = command === applyAction ? await editOf(session, carried, token) : null;
        if (edit) await connection.sendRequest(ApplyWorkspaceEditRequest.type, { edit });
        return null;
      });
  },
};

function found(
  { client, convert, now }: Session,
  look: LookAt,
  { start, end }: Range,
  only: readonly string[] | null,
): Generator<void, readonly Action[]> {
  const selection = { file: look.file, from: convert.cursor(look, start), to: convert.cursor(look, end) };
  // A document without a folder has no place beside it.
  const canCreate = client.fileCreation && client.versionedEdits && isAbsolute(look.key);
  return actionsAt({ farm: look.farm, selection, canCreate, now: now() }, only);
}

function* allWritten(
  session: Session,
  look: LookAt,
  actions: readonly Action[],
  carried: Omit<Carried, "place" | "title">,
): Generator<void, (CodeAction | Command)[]> {
  const all: (CodeAction | Command)[] = [];
  for (const [place, action] of actions.entries()) {
    all.push(written(session, look, action, { ...carried, place, title: action.title }));
    yield;
  }
  return all;
}

/** An action as the client can take it. */
function written(session: Session, look: LookAt, action: Action, carried: Carried): CodeAction | Command {
  const { client } = session;
  const { title, kind, problem, isPreferred } = action;
  if (!client.actionLiterals) return { title, command: applyAction, arguments: [carried] };
  return {
    title,
    kind,
    ...(problem ? { diagnostics: [diagnosticOf(session, look, problem)] } : {}),
    ...(isPreferred && client.preferredActions ? { isPreferred } : {}),
    ...(client.actionResolves.includes("edit")
      ? { data: carried }
      : { edit: protocolEdit(session, look, action) }),
  };
}

function protocolEdit({ convert }: Session, look: LookAt, action: Action): WorkspaceEdit {
  const { edits, created } = action.edit();
  return convert.workspaceEdit(look, edits, created);
}

/** The edit of an action that was offered before; refused where its text has changed meanwhile. */
async function editOf(
  session: Session,
  carried: Partial<Carried> | undefined,
  token: CancellationToken,
): Promise<WorkspaceEdit | null> {
  const { uri, version, range, only = null, place, title } = carried ?? {};
  if (uri === undefined || range === undefined || place === undefined) return null;
  return about(session, uri, token, async (look) => {
    const action = (await inTurns(found(session, look, range, only), token))[place];
    if (!action || action.title !== title || look.versionOf(look.file) !== version)
      throw new ResponseError(LSPErrorCodes.ContentModified, "The text has changed. Ask again.");
    return protocolEdit(session, look, action);
  });
}
