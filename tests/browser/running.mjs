// Runs the crane worksheet in JupyterLab as a user does, and looks at what it shows.

import { join } from "node:path";
import { report } from "./report.mjs";
import { checkNoRawFormulas, unfoldSteps, visibleText, watchedPage } from "./watch.mjs";

const SESSION_TIMEOUT = 300_000;
const RUN_TIMEOUT = 600_000;

// The toolbar says idle before the session is there; cells run then would be lost.
async function sessionReady(page) {
  await page.waitForFunction(
    () => {
      const context = globalThis.jupyterapp?.shell?.currentWidget?.sessionContext;
      const kernel = context?.session?.kernel;
      return context?.isReady && kernel?.connectionStatus === "connected" && kernel?.status === "idle";
    },
    null,
    { timeout: SESSION_TIMEOUT },
  );
}

async function runAll(page) {
  await page.getByRole("menuitem", { name: "Run", exact: true }).click();
  await page.getByRole("menuitem", { name: "Run All Cells", exact: true }).click();
}

// The code cells: how many, how many have run, and the text of the first error.
function progress(page) {
  return page.evaluate(() => {
    const { model } = globalThis.jupyterapp.shell.currentWidget.content;
    const cells = [...model.cells].filter((cell) => cell.type === "code");
    const error = cells.flatMap((cell) => cell.outputs.toJSON()).find((output) => output.output_type === "error");
    return {
      all: cells.length,
      run: cells.filter((cell) => cell.executionCount !== null && cell.executionState !== "running").length,
      error: error && `${error.ename}: ${error.evalue}`,
    };
  });
}

async function finished(page) {
  const deadline = Date.now() + RUN_TIMEOUT;
  for (;;) {
    const state = await progress(page);
    if (state.error || state.run === state.all) return state;
    if (Date.now() > deadline) throw new Error(`only ${state.run} of ${state.all} cells ran`);
    await page.waitForTimeout(500);
  }
}

export async function checkRunning(browser, lab, plan) {
  const { page, errors, outside, close } = await watchedPage(browser);
  try {
    await page.goto(lab.address(plan.worksheet));
    await page.locator(".jp-NotebookPanel").waitFor();
    const kernel = page.locator(".jp-NotebookPanel-toolbar .jp-KernelName");
    await sessionReady(page);
    report.check((await kernel.innerText()).includes("Gudgeon"), "the kernel is selected");

    // Outputs that came with the file must not be taken for those of this run.
    await page.evaluate(() => globalThis.jupyterapp.commands.execute("editmenu:clear-all"));
    const areas = page.locator(".jp-OutputArea-output");
    report.check((await areas.count()) === 0, "the outputs of the file were cleared");

    await runAll(page);
    const state = await finished(page);
    report.check(!state.error, state.error ? `a cell failed: ${state.error}` : `all ${state.all} code cells ran`);

    const formulas = page.locator(".jp-OutputArea-output .katex-html");
    await formulas.first().waitFor({ timeout: 60_000 });
    // Formulas are typeset one after another once the script has come.
    await page.waitForTimeout(2_000);
    report.check((await formulas.count()) >= 20, `${await formulas.count()} formulas are typeset`);
    report.check((await page.locator(".jp-OutputArea-output .katex-error").count()) === 0, "none of them is marked as wrong");
    const font = await formulas.first().evaluate((formula) => {
      const size = getComputedStyle(formula.closest(".katex")).fontFamily;
      return { size, loaded: [...document.fonts].filter((face) => face.family.includes("KaTeX") && face.status === "loaded").length };
    });
    report.check(font.size.includes("KaTeX") && font.loaded > 0, `in the fonts of the kernelspec (${font.loaded} loaded)`);
    const text = await visibleText(areas);
    checkNoRawFormulas(text);
    report.check(/proved/i.test(text), "the verdicts are there in words");

    await pictures(page, plan, "lab-light");
    await unfoldSteps(page.locator(".jp-Notebook"), ".katex-html");
    await page.screenshot({ path: join(plan.pictures, "lab-light-unfolded.png") });
    await page.evaluate(() =>
      globalThis.jupyterapp.commands.execute("apputils:change-theme", { theme: "JupyterLab Dark" }),
    );
    await page.waitForTimeout(1_500);
    await pictures(page, plan, "lab-dark");

    report.check(errors.length === 0, errors.length ? `errors in the page: ${errors.join("; ")}` : "no errors in the page");
    report.check(outside.length === 0, outside.length ? `requests left the machine: ${outside.join(" ")}` : "no request left the machine");
    await page.evaluate(() => globalThis.jupyterapp.commands.execute("docmanager:save"));
  } catch (error) {
    await page.screenshot({ path: join(plan.pictures, "lab-failed.png") });
    report.note(lab.log().slice(-3000));
    throw error;
  } finally {
    await close();
  }
}

// One screenshot for each window full of the notebook.
async function pictures(page, plan, name) {
  const scroller = page.locator(".jp-WindowedPanel-outer").first();
  const { height, whole } = await scroller.evaluate((part) => ({ height: part.clientHeight, whole: part.scrollHeight }));
  for (let at = 0, number = 1; at < whole; at += height, number += 1) {
    await scroller.evaluate((part, top) => (part.scrollTop = top), at);
    await page.waitForTimeout(400);
    await page.screenshot({ path: join(plan.pictures, `${name}-${number}.png`) });
  }
  await scroller.evaluate((part) => (part.scrollTop = 0));
  await page.waitForTimeout(400);
}
