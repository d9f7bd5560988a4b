// Owns the table of evidence left after a test run: test-results/evidence.json and evidence.md.
// Must not know how any row was found.
import { mkdirSync, writeFileSync } from 'node:fs';
import type { Reporter, TestModule } from 'vitest/node';
import { holds, type EvidenceRow } from './evidence.ts';

const DIRECTORY = 'test-results';

interface ReportedRow extends EvidenceRow {
  readonly test: string;
  readonly holds: boolean;
}

export default class EvidenceReporter implements Reporter {
  onTestRunEnd(modules: readonly TestModule[]): void {
    const rows: ReportedRow[] = [];
    const ordered = [...modules].sort((a, b) => a.moduleId.localeCompare(b.moduleId));
    for (const module of ordered) {
      for (const test of module.children.allTests()) {
        for (const row of test.meta().evidence ?? []) rows.push({ test: test.fullName, ...row, holds: holds(row) });
      }
    }
    // A run of other tests leaves the last table alone.
    if (rows.length === 0) return;
    mkdirSync(DIRECTORY, { recursive: true });
    writeFileSync(`${DIRECTORY}/evidence.json`, `${JSON.stringify(rows, null, 1)}\n`);
    writeFileSync(`${DIRECTORY}/evidence.md`, makeTable(rows));
  }
}

function makeTable(rows: readonly ReportedRow[]): string {
  const lines = [
    '# Evidence',
    '',
    '| case | source | expected | found | allowed difference | holds |',
    '| --- | --- | ---: | ---: | ---: | :---: |',
  ];
  let test = '';
  for (const row of rows) {
    if (row.test !== test) lines.push(`| **${cell(row.test)}** | | | | | |`);
    test = row.test;
    const unit = row.unit === '' ? '' : ` ${row.unit}`;
    const numbers = [row.expected, row.found].map((value) => `${Number(value.toPrecision(8))}${unit}`);
    const allowed = `${Number(row.tolerance.toPrecision(2))}${unit}`;
    lines.push(
      `| ${cell(row.case)} | ${cell(row.source)} | ${numbers[0]} | ${numbers[1]} | ${allowed} | ${row.holds ? 'yes' : '**no**'} |`,
    );
  }
  return `${lines.join('\n')}\n`;
}

function cell(text: string): string {
  return text.replaceAll('|', '\\|');
}
