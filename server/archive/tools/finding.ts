/** What a check found wrong: where, and in plain words what. */
export interface Finding {
  readonly where: string;
  readonly message: string;
}

/** Collects what was checked and what was found wrong. */
export class Report {
  readonly checked: string[] = [];
  readonly findings: Finding[] = [];

  ok(what: string): void {
    this.checked.push(what);
  }

  wrong(where: string, message: string): void {
    this.findings.push({ where, message });
  }

  /** Runs one part; what it throws (a file that cannot be read, text that is no JSON) is a finding. */
  async part(what: string, check: () => Promise<string> | string): Promise<void> {
    const before = this.findings.length;
    try {
      const done = await check();
      if (this.findings.length === before) this.ok(`${what}: ${done}`);
    } catch (error) {
      this.wrong(what, error instanceof Error ? error.message : String(error));
    }
  }
}
