// Opens the static page that nbconvert makes, without network: the MathML of the worksheet must read.

import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { report } from "./report.mjs";
import { checkNoRawFormulas, unfoldSteps, visibleText, watchedPage } from "./watch.mjs";

export async function checkExport(browser, plan) {
  const { page, close } = await watchedPage(browser, { offline: true });
  try {
    await page.goto(pathToFileURL(plan.exported).href, { waitUntil: "domcontentloaded" });
    const area = page.locator(".jp-OutputArea-output");
    const formulas = area.locator("math");
    await formulas.first().waitFor({ timeout: 60_000 });
    await page.waitForTimeout(1_000);
    report.check((await formulas.count()) >= 20, `${await formulas.count()} formulas are there as MathML`);
    const box = await formulas.first().boundingBox();
    report.check(box !== null && box.width > 10 && box.height > 5, "the first has a size");
    checkNoRawFormulas(await visibleText(area));
    await page.screenshot({ path: join(plan.pictures, "export.png") });
    await unfoldSteps(page.locator("body"), "math");
  } finally {
    await close();
  }
}
