// A whole VS Code, served to a browser from this machine, with the packed extension in it and folders of its own.
import { spawn, spawnSync } from "node:child_process";
import { cpSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";

const root = resolve(import.meta.dirname, "../..");
const tools = join(import.meta.dirname, "node_modules");
const vscode = join(tools, "code-server/out/node/entry.js");

/** All that is looked at is as at this minute, so that the answers are the same on any day. */
export const moment = "2026-12-01T08:00";

const quiet = {
  "workbench.startupEditor": "none",
  "chat.disableAIFeatures": true,
  "telemetry.telemetryLevel": "off",
  "update.mode": "none",
  "extensions.autoUpdate": false,
  "extensions.autoCheckUpdates": false,
  "extensions.ignoreRecommendations": true,
  "workbench.enableExperiments": false,
  "workbench.tips.enabled": false,
  "git.enabled": false,
  "editor.cursorBlinking": "solid",
  "editor.minimap.enabled": false,
  "workbench.secondarySideBar.defaultVisibility": "hidden",
  "files.autoSave": "off",
};

/** Installs the packed extension; `start` gives one running VS Code, `farm` a fresh copy of the example farm. */
export function workbench(vsix) {
  const folder = mkdtempSync(join(tmpdir(), "marl-workbench-"));
  const extensions = join(folder, "extensions");
  const words = (data) => ["--user-data-dir", data, "--extensions-dir", extensions];
  const environment = {
    ...process.env,
    PATH: `${join(tools, "node/bin")}:${process.env.PATH}`,
    HOME: folder,
    XDG_CONFIG_HOME: join(folder, "config"),
    MARL_AT: moment,
  };
  const node = join(tools, "node/bin/node");

  const installing = spawnSync(
    node,
    [vscode, "--install-extension", vsix, ...words(join(folder, "install"))],
    {
      env: environment,
      encoding: "utf8",
    },
  );
  if (installing.status !== 0 || !/successfully installed/.test(installing.stdout))
    throw new Error(`The extension wasn't installed:\n${installing.stdout}${installing.stderr}`);

  let farms = 0;
  return {
    farm() {
      const path = join(folder, "farms", String(++farms), "farm");
      const restore = () => cpSync(join(root, "examples"), path, { recursive: true });
      restore();
      return { path, restore };
    },
    async start(settings = {}) {
      const data = mkdtempSync(join(folder, "data-"));
      mkdirSync(join(data, "User"), { recursive: true });
      writeFileSync(join(data, "User/settings.json"), JSON.stringify({ ...quiet, ...settings }, null, 2));
      const port = await freePort();
      const running = spawn(
        node,
        [
          vscode,
          ...["--bind-addr", `127.0.0.1:${port}`, "--auth", "none"],
          ...["--disable-telemetry", "--disable-update-check", "--disable-getting-started-override"],
          ...words(data),
        ],
        { env: environment, stdio: ["ignore", "pipe", "pipe"] },
      );
      await listening(running);
      return {
        address: (farm) => `http://127.0.0.1:${port}/?folder=${encodeURIComponent(farm)}`,
        servers: () => languageServers(running.pid),
        stop: () => stop(running),
      };
    },
    logs: () => logsIn(folder),
    remove: () => rmSync(folder, { recursive: true, force: true }),
  };
}

function freePort() {
  return new Promise((found, failed) => {
    const server = createServer();
    server.once("error", failed);
    server.listen(0, "127.0.0.1", () => {
      const { port } = server.address();
      server.close(() => found(port));
    });
  });
}

function listening(running) {
  return new Promise((ready, failed) => {
    let said = "";
    const listen = (chunk) => {
      said += chunk;
      if (/HTTP server listening/.test(said)) ready();
    };
    running.stdout.on("data", listen);
    running.stderr.on("data", listen);
    running.once("exit", () => failed(new Error(`VS Code didn't start:\n${said}`)));
  });
}

function stop(running) {
  return new Promise((stopped) => {
    if (running.exitCode !== null || running.signalCode !== null) return stopped();
    running.once("exit", stopped);
    const below = descendants(running.pid);
    running.kill("SIGTERM");
    // What it had started ends with it, even where it hangs.
    setTimeout(() => {
      for (const pid of [running.pid, ...below]) end(pid);
    }, 3000).unref();
  });
}

/** The language servers of Marl among the processes that a VS Code has started. */
function languageServers(pid) {
  return descendants(pid).filter((child) => /\/server\.cjs/.test(commandOf(child)));
}

function descendants(pid) {
  const parents = new Map();
  for (const entry of readdirSync("/proc").filter((name) => /^\d+$/.test(name))) {
    const parent = /\) \S (\d+)/.exec(fileOr(`/proc/${entry}/stat`))?.[1];
    if (parent) parents.set(Number(entry), Number(parent));
  }
  const isBelow = (child) => child !== undefined && (child === pid || isBelow(parents.get(child)));
  return [...parents.keys()].filter((child) => child !== pid && isBelow(child));
}

const commandOf = (pid) => fileOr(`/proc/${pid}/cmdline`).replaceAll("\0", " ");

function fileOr(path, otherwise = "") {
  try {
    return readFileSync(path, "utf8");
  } catch {
    return otherwise;
  }
}

function end(pid) {
  try {
    process.kill(pid, "SIGKILL");
  } catch {
    // It is gone.
  }
}

/** What VS Code wrote down of the extension: its output channels, and of the host that runs extensions. */
function logsIn(folder) {
  return readdirSync(folder, { recursive: true, encoding: "utf8" })
    .filter((path) => /(Marl|remoteexthost)\.log$/.test(path))
    .map((path) => ({ path, text: fileOr(join(folder, path)) }))
    .filter(({ text }) => text !== "");
}
