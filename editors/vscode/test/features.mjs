// Checks of the probe's answers that are particular to VS Code.
//   node features.mjs PROBE.json REVIEW.json
import { readFileSync } from 'node:fs';

const [probe, reviewed] = process.argv.slice(2).map((file) => JSON.parse(readFileSync(file, 'utf8')));
const review = reviewed.notes[0];
let failed = 0;

function check(title, good, seen) {
  console.log(`${good ? 'ok  ' : 'FAIL'}  VS Code: ${title}`);
  if (!good) { failed++; console.log(`      ${JSON.stringify(seen)}`); }
}

check('the probe met no error', !probe.error, probe.error);
check('the note is a Joule note', probe.language === 'joule', probe.language);
check('values stand at line ends', probe.hints?.every((h) => h.atEnd), probe.hints);
check('inkjoule.hints.results off hides the values', probe.hintsOff === 0, probe.hintsOff);
check('and on shows them again', probe.hintsOnAgain === probe.hints?.length, probe.hintsOnAgain);

const names = (probe.symbols ?? []).map((s) => s.name);
const missing = review.values.filter((v) => !names.includes(v.name.split('.').pop()) && !names.includes(v.name));
check(`every value is in the outline (${review.values.length})`, missing.length === 0, { missing: missing.map((v) => v.name), names });

const fixable = review.findings.filter((f) => f.fix);
const unfixed = fixable.filter((f) => !probe.fixes?.some((x) => x.rule === f.rule && x.line === f.line && x.applied));
check(`each fix that review names is offered and applies (${fixable.length})`, unfixed.length === 0, { unfixed, fixes: probe.fixes });
check('there is a fix to apply', probe.fixes?.some((f) => f.applied), probe.fixes);
process.exit(failed === 0 ? 0 : 1);
