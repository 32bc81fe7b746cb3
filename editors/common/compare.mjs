// Holds what an editor shows against what `inkjoule review --format json` says of
// the same text, and prints a line per check.
//
//   node compare.mjs EDITOR NOTE REVIEW.json DUMP.json
//
// The dump is what a script inside the editor wrote:
//   {columns: "utf-8" | "utf-16" | "utf-32",   what the editor counts
//    diagnostics: [{line, column, endLine, endColumn, rule, severity, message}],
//                                               ("caution or advice" where it knows two grades only)
//    hints: [{line, text}],                     computed values shown in the text
//    hovers: [{name, text}]}                    what a hover over a name's definition says
// Lines and columns are 1-based, ends exclusive. A key that is absent is not
// compared: the editor cannot show it (each test says so in its README).
import { readFileSync } from 'node:fs';

const [editor, notePath, reviewPath, dumpPath] = process.argv.slice(2);
const text = readFileSync(notePath, 'utf8');
const lines = text.split(/\r\n|\n|\r/);
const review = JSON.parse(readFileSync(reviewPath, 'utf8')).notes[0];
const dump = JSON.parse(readFileSync(dumpPath, 'utf8'));

let failed = 0;

function check(title, problems) {
  if (problems.length === 0) {
    console.log(`ok    ${editor}: ${title}`);
    return;
  }
  failed++;
  console.log(`FAIL  ${editor}: ${title}`);
  for (const problem of problems.slice(0, 12)) console.log(`      ${problem}`);
}

/** A column in the editor's units as one in code points, which review prints. */
function codePoints(line, column) {
  const source = lines[line - 1] ?? '';
  if (dump.columns === 'utf-32') return column;
  if (dump.columns === 'utf-16') return [...source.slice(0, column - 1)].length + 1;
  return [...Buffer.from(source).subarray(0, column - 1).toString()].length + 1;
}

/** What of two lists is in one only, as sentences. */
function differences(shown, expected) {
  const rest = [...expected];
  const problems = [];
  for (const item of shown) {
    const at = rest.indexOf(item);
    if (at >= 0) rest.splice(at, 1);
    else problems.push(`only in the editor: ${item}`);
  }
  return problems.concat(rest.map((item) => `only in review: ${item}`));
}

/** The findings as one line each, with the parts that the editor tells. */
function findingLines(list, parts, column) {
  return list.map((f) => {
    const out = [f.rule];
    if (parts.severity) out.push(parts.two && f.severity !== 'error' ? 'caution or advice' : f.severity);
    out.push(`${f.line}:${column(f.line, f.column)}`);
    if (parts.end) out.push(`to ${f.endLine}:${column(f.endLine, f.endColumn)}`);
    return out.join(' ');
  });
}

function compareFindings() {
  const one = dump.diagnostics[0] ?? {};
  const parts = {
    severity: 'severity' in one,
    two: dump.diagnostics.some((d) => d.severity === 'caution or advice'),
    end: 'endColumn' in one,
  };
  const shown = findingLines(dump.diagnostics, parts, codePoints);
  const expected = findingLines(review.findings, parts, (_, column) => column);
  const what = ['rule', parts.severity && 'severity', 'start', parts.end && 'end'].filter(Boolean).join(', ');
  check(`the findings of review (${expected.length}; ${what})`, differences(shown, expected));
  check('there is something to find', expected.length > 0 ? [] : ['review found nothing, so this test shows nothing']);
  compareMessages();
}

function compareMessages() {
  const problems = [];
  for (const f of review.findings) {
    const shown = dump.diagnostics.filter((d) => d.rule === f.rule && d.line === f.line);
    if (!shown.some((d) => plain(d.message).includes(plain(f.message)))) {
      problems.push(`line ${f.line} lacks "${f.message}", shows "${shown.map((d) => d.message).join(' | ')}"`);
    }
  }
  check('each finding says what review says', problems);
}

/** A definition that neither is an input nor states its result gets a hint. */
function statesNothing(value) {
  const statement = lines[value.line - 1].replace(/"[^"]*"/g, '').replace(/#.*/, '').replace(/\bper\s*$/, '');
  const members = statement.split(/(?<![<>])=/).slice(1);
  const last = members.at(-1)?.trim() ?? '';
  return members.length < 2 || !/^[-−]?(\d|\()/.test(last);
}

function compareHints() {
  const expected = review.values.filter((v) => !v.input && v.shown && statesNothing(v));
  const problems = [];
  for (const v of expected) {
    const here = dump.hints.filter((h) => h.line === v.line);
    if (!here.some((h) => plain(h.text).includes(plain(v.shown)))) {
      problems.push(`line ${v.line}: no hint with ${v.name} = ${v.shown}, but ${JSON.stringify(here.map((h) => h.text))}`);
    }
  }
  for (const h of dump.hints) {
    if (!expected.some((v) => v.line === h.line)) problems.push(`line ${h.line}: review does not expect the hint "${h.text}"`);
  }
  check(`the values of review at the line ends (${expected.length})`, problems);
}

function compareHovers() {
  const problems = [];
  for (const h of dump.hovers) {
    const value = review.values.find((v) => v.name === h.name);
    if (!value) problems.push(`review knows no value ${h.name}`);
    else if (value.shown && !plain(h.text).includes(plain(value.shown))) {
      problems.push(`${h.name}: hover lacks "${value.shown}": ${JSON.stringify(h.text)}`);
    }
  }
  if (dump.hovers.length === 0) problems.push('nothing was hovered');
  check(`hover tells the value (${dump.hovers.length})`, problems);
}

/** Blanks and Markdown's escapes do not count. */
function plain(s) {
  return String(s).replace(/\\([\\`*_{}[\]()#+\-.!|<>~^])/g, '$1').replace(/[\s\u00a0]+/g, ' ').trim();
}

if (dump.diagnostics) compareFindings();
if (dump.hints) compareHints();
if (dump.hovers) compareHovers();
process.exit(failed === 0 ? 0 : 1);
