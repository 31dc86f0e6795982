// A page that keeps account of its errors and of the requests that leave this machine.

import { report } from "./report.mjs";

// A tall window: nearly the whole worksheet is laid out and fits on a screenshot.
const WINDOW = { width: 1280, height: 1600 };

export async function watchedPage(browser, { offline = false } = {}) {
  const context = await browser.newContext({ viewport: WINDOW });
  const page = await context.newPage();
  const errors = [];
  const outside = [];
  page.on("pageerror", (error) => errors.push(`${error}`));
  page.on("console", (message) => {
    if (message.type() === "error") errors.push(`${message.text()} (${message.location().url})`);
  });
  page.on("request", (request) => {
    const { protocol, hostname } = new URL(request.url());
    if (["http:", "https:", "ws:", "wss:"].includes(protocol) && hostname !== "127.0.0.1") {
      outside.push(request.url());
    }
  });
  if (offline) {
    await context.route(/^https?:/, (route) => route.abort());
  }
  return {
    page,
    errors,
    outside,
    close: () => context.close(),
  };
}

// Text that a reader sees, without the copies that are kept for screen readers.
export async function visibleText(locator) {
  return locator.evaluateAll((areas) =>
    areas
      .map((area) => {
        const copy = area.cloneNode(true);
        copy.querySelectorAll("script, style, annotation, .katex-mathml, mjx-assistive-mml").forEach((part) => part.remove());
        return copy.textContent;
      })
      .join("\n"),
  );
}

export function checkNoRawFormulas(text) {
  const at = text.search(/\$\$|\\frac|\\dot|\\left/);
  report.check(at < 0, at < 0 ? "no formula is left as source text" : `a formula is left as source text: ${text.slice(Math.max(0, at - 60), at + 120)}`);
}

// Opens the steps under the first result that has formulas in its steps.
export async function unfoldSteps(area, formula) {
  const folded = area.locator("details").filter({ has: area.page().locator(formula) });
  const count = await folded.count();
  report.check(count > 0, `${count} results have folded steps with formulas`);
  if (count === 0) return;
  const first = folded.first();
  const step = first.locator(formula).first();
  const open = await first.evaluate((details) => details.open);
  report.check(!open && !(await step.isVisible()), "the steps are folded at first");
  await first.locator("summary").first().click();
  await step.waitFor({ state: "visible", timeout: 10_000 });
  const box = await step.boundingBox();
  report.check(box !== null && box.width > 10 && box.height > 5, "a click unfolds them, typeset");
}
