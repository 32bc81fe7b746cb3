// One fact of a review, for a script that looks for it on a screen.
//   node facts.mjs NOTE REVIEW.json value|line|message|text|rule
import { readFileSync } from 'node:fs';

const [note, reviewed, wanted] = process.argv.slice(2);
const lines = readFileSync(note, 'utf8').split('\n');
const { values, findings } = JSON.parse(readFileSync(reviewed, 'utf8')).notes[0];
const f = findings[0];
const facts = {
  value: () => values.find((v) => !v.input && v.shown).shown,
  line: () => f.line,
  rule: () => f.rule,
  message: () => f.message,
  text: () => lines[f.line - 1].trim().slice(0, 20),
};
console.log(facts[wanted]());
