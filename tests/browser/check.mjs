// Opens worksheets in a real JupyterLab and in Chromium, as a user would, and says what it saw.
//
// Called by `tests/browser.rs` with one argument, a JSON object:
//   chromium, program      the programs to use
//   gallery                the folder that JupyterLab opens
//   worksheet, untrusted   files in it: one to run, and an executed one that nobody here has trusted
//   exported               the executed worksheet as a static page
//   pictures               the folder for screenshots

import { mkdirSync } from "node:fs";
import { chromium } from "playwright-core";
import { startLab } from "./lab.mjs";
import { checkExport } from "./export.mjs";
import { checkRunning } from "./running.mjs";
import { checkUntrusted } from "./untrusted.mjs";
import { report } from "./report.mjs";

// What the browser would otherwise ask the network for at every start.
const QUIET = [
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];

const plan = JSON.parse(process.argv[2]);
mkdirSync(plan.pictures, { recursive: true });

const browser = await chromium.launch({ executablePath: plan.chromium, args: QUIET });
report.note(`browser ${browser.version()}`);
try {
  await report.section("static export", () => checkExport(browser, plan));
  const lab = await startLab(plan);
  try {
    await report.section("worksheet run in JupyterLab", () => checkRunning(browser, lab, plan));
    await report.section("worksheet from an untrusted sender", () => checkUntrusted(browser, lab, plan));
  } finally {
    await lab.stop();
  }
} finally {
  await browser.close();
}
process.exitCode = report.finish();
