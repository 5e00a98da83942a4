import type { Reporter, TestModule } from 'vitest/node';
import type { Accuracy } from '../reference/accuracy.ts';

/** Prints what the reference tests measured, as the table that stands in the README. */
export default class AccuracyTable implements Reporter {
  onTestRunEnd(modules: ReadonlyArray<TestModule>): void {
    const rows = modules
      .flatMap((module) => [...module.children.allTests()])
      .map((test) => test.meta().accuracy)
      .filter((row): row is Accuracy => row !== undefined);
    console.log('| what | against | n | bias | rms | largest | allowed |\n|---|---|---|---|---|---|---|');
    const digits = (value: number) => Number(value.toPrecision(2)).toString();
    for (const { what, against, unit, count, bias, rms, max, allowed } of rows) {
      console.log(
        `| ${what} | ${against} | ${count} | ${digits(bias)} | ${digits(rms)} | ${digits(max)} ${unit} | ${allowed} ${unit} |`,
      );
    }
  }
}
