// Opens an executed worksheet that nobody has trusted: JupyterLab strips its scripts and typesets the
// formulas by its own means.

import { join } from "node:path";
import { report } from "./report.mjs";
import { checkNoRawFormulas, unfoldSteps, visibleText, watchedPage } from "./watch.mjs";

export async function checkUntrusted(browser, lab, plan) {
  const { page, errors, outside, close } = await watchedPage(browser);
  try {
    await page.goto(lab.address(plan.untrusted));
    await page.locator(".jp-NotebookPanel").waitFor();
    const formulas = page.locator(".jp-OutputArea-output mjx-container");
    await formulas.first().waitFor({ timeout: 60_000 });
    await page.waitForTimeout(3_000);
    const trusted = await page.evaluate(() =>
      [...globalThis.jupyterapp.shell.currentWidget.content.model.cells].some((cell) => cell.type === "code" && cell.trusted),
    );
    report.check(!trusted, "the file is not trusted");
    report.check((await formulas.count()) >= 20, `${await formulas.count()} formulas are typeset`);
    report.check((await page.locator(".jp-OutputArea-output .katex").count()) === 0, "no script of the file ran");
    report.check((await page.locator(".jp-OutputArea-output mjx-merror").count()) === 0, "none of them is marked as wrong");
    checkNoRawFormulas(await visibleText(page.locator(".jp-OutputArea-output")));
    await page.screenshot({ path: join(plan.pictures, "lab-untrusted.png") });
    await unfoldSteps(page.locator(".jp-Notebook"), "mjx-container");
    report.check(errors.length === 0, errors.length ? `errors in the page: ${errors.join("; ")}` : "no errors in the page");
    report.check(outside.length === 0, outside.length ? `requests left the machine: ${outside.join(" ")}` : "no request left the machine");
  } catch (error) {
    await page.screenshot({ path: join(plan.pictures, "lab-untrusted-failed.png") });
    throw error;
  } finally {
    await close();
  }
}
