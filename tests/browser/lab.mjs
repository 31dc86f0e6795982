// Starts JupyterLab by `gudgeon lab` on a free port of this machine, and stops it.

import { spawn } from "node:child_process";
import { once } from "node:events";
import { createServer } from "node:net";
import { setTimeout as pause } from "node:timers/promises";
import { randomBytes } from "node:crypto";

const START_SECONDS = 600; // the first start compiles the helper library

async function freePort() {
  const server = createServer();
  server.listen(0, "127.0.0.1");
  await once(server, "listening");
  const { port } = server.address();
  server.close();
  await once(server, "close");
  return port;
}

export async function startLab(plan) {
  const port = await freePort();
  const token = randomBytes(16).toString("hex");
  const base = `http://127.0.0.1:${port}`;
  const args = [
    "lab",
    plan.gallery,
    "--",
    "--no-browser",
    "--allow-root",
    "--expose-app-in-browser",
    "--ip=127.0.0.1",
    `--port=${port}`,
    "--ServerApp.port_retries=0",
    `--IdentityProvider.token=${token}`,
    "--LabApp.extension_manager=readonly",
    "--LabApp.news_url=None",
  ];
  const server = spawn(plan.program, args, { stdio: ["ignore", "pipe", "pipe"] });
  let log = "";
  for (const stream of [server.stdout, server.stderr]) {
    stream.on("data", (text) => (log += text));
  }
  let ended = false;
  server.on("exit", () => (ended = true));
  server.on("error", (error) => {
    ended = true;
    log += `${error}`;
  });

  const ask = (path, options = {}) =>
    fetch(`${base}${path}`, { headers: { Authorization: `token ${token}` }, ...options });
  for (let second = 0; ; second += 1) {
    if (ended || second > START_SECONDS) {
      server.kill();
      throw new Error(`JupyterLab did not start:\n${log}`);
    }
    const answer = await ask("/api/status").catch(() => null);
    if (answer?.ok) break;
    await pause(1000);
  }

  return {
    base,
    token,
    ask,
    log: () => log,
    address: (file) => `${base}/lab/tree/${file}?token=${token}&reset`,
    async stop() {
      await ask("/api/shutdown", { method: "POST" }).catch(() => null);
      for (let tenth = 0; !ended && tenth < 200; tenth += 1) await pause(100);
      if (!ended) server.kill("SIGKILL");
    },
  };
}
