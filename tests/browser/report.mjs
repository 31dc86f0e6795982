// Collects what was checked: one line each, and an exit code.

class Report {
  #failures = 0;

  note(text) {
    console.log(`   ${text}`);
  }

  // A check that goes on after a failure, so that one run shows all that is wrong.
  check(holds, text) {
    console.log(`${holds ? "ok " : "NO "}${text}`);
    if (!holds) this.#failures += 1;
  }

  // A part of the check; an exception in it fails the part and the next part is tried.
  async section(title, work) {
    console.log(`-- ${title}`);
    try {
      await work();
    } catch (error) {
      this.check(false, `${title}: ${error.stack ?? error}`);
    }
  }

  finish() {
    console.log(this.#failures === 0 ? "all checks passed" : `${this.#failures} checks failed`);
    return this.#failures === 0 ? 0 : 1;
  }
}

export const report = new Report();
