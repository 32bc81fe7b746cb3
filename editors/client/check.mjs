// Speaks to the language server as an independent client: initialises, opens, edits,
// asks for every feature that the server offers, checks the shape of each reply,
// and shuts down. Prints a line per check.
//   node check.mjs PROGRAM NOTE
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { Document } from './document.mjs';
import { features } from './features.mjs';
import { Session, pause, within } from './session.mjs';
import * as shapes from './shapes.mjs';

const [program, note] = process.argv.slice(2);
const folder = mkdtempSync(path.join(tmpdir(), 'inkjoule-client.'));
const original = readFileSync(note, 'utf8');
let failed = 0;

function check(title, complaints) {
  const list = [complaints].flat().filter(Boolean);
  console.log(`${list.length === 0 ? 'ok  ' : 'FAIL'}  client: ${title}`);
  failed += list.length > 0 ? 1 : 0;
  for (const complaint of list.slice(0, 8)) console.log(`      ${complaint}`);
}

/** A scenario: what it throws is a failed check, and no server outlives it. */
async function scenario(title, run) {
  const sessions = [];
  const start = () => (sessions.push(new Session(program)), sessions.at(-1));
  try {
    await within(60000, run(start), title);
  } catch (error) {
    const log = sessions.at(-1)?.log.split('\n').slice(-4).join(' | ');
    check(title, `${error?.stack ?? error}`.split('\n').slice(0, 3).join(' / ') + ` (server's log: ${log})`);
  }
  for (const s of sessions) {
    if (s.broken.length > 0) check(`${title}: standard output holds messages only`, s.broken);
    if (s.messages.length > 0) check(`${title}: nothing pops up`, s.messages.map((m) => m.message));
    s.kill();
  }
}

function newDocument(encoding, text = original) {
  const file = path.join(folder, 'note.joule');
  writeFileSync(file, text);
  return new Document(pathToFileURL(file).href, text, encoding);
}

/** What the command line says of the same text. */
function review(text) {
  const file = path.join(folder, 'note.joule');
  writeFileSync(file, text);
  let out;
  try {
    out = execFileSync(program, ['review', '--format', 'json', file], { encoding: 'utf8' });
  } catch (error) {
    if (error.status !== 1) throw error;
    out = error.stdout;
  }
  return JSON.parse(out).notes[0];
}

const severities = [undefined, 'error', 'caution', 'advice', 'advice'];
const line = (rule, severity, from, to) => `${rule} ${severity} ${from.join(':')} to ${to.join(':')}`;

/** The diagnostics of the server and the findings of review, compared as text. */
function compare(document, diagnostics) {
  const shown = diagnostics.map((d) => line(d.code, severities[d.severity],
    [d.range.start.line + 1, document.column(d.range.start)], [d.range.end.line + 1, document.column(d.range.end)]));
  const expected = review(document.text).findings.map((f) => line(f.rule, f.severity, [f.line, f.column], [f.endLine, f.endColumn]));
  return [
    ...shown.filter((s) => !expected.includes(s)).map((s) => `only from the server: ${s}`),
    ...expected.filter((e) => !shown.includes(e)).map((e) => `only from review: ${e}`),
    shown.length !== expected.length && `${shown.length} diagnostics, ${expected.length} findings`,
    expected.length === 0 && 'review finds nothing, so this shows nothing',
  ];
}

const synchronization = { didSave: true, dynamicRegistration: false };
const text = {
  synchronization,
  publishDiagnostics: { relatedInformation: true, versionSupport: true, codeDescriptionSupport: true },
  hover: { contentFormat: ['markdown', 'plaintext'] },
  documentSymbol: { hierarchicalDocumentSymbolSupport: true },
  codeAction: { codeActionLiteralSupport: { codeActionKind: { valueSet: ['quickfix', 'refactor', 'source', 'source.fixAll'] } } },
  completion: { completionItem: { snippetSupport: false } },
  rename: { prepareSupport: true },
  inlayHint: {}, semanticTokens: { requests: { full: true, range: true }, tokenTypes: [], tokenModifiers: [], formats: ['relative'] },
  foldingRange: {}, selectionRange: {}, documentLink: {}, callHierarchy: {},
};
const push = { textDocument: text };
const pull = {
  textDocument: { ...text, diagnostic: { relatedDocumentSupport: true } },
  workspace: { diagnostics: { refreshSupport: true }, inlayHint: { refreshSupport: true } },
};

for (const encoding of ['utf-8', 'utf-16', 'utf-32']) {
  await scenario(`columns in ${encoding}`, async (start) => {
    const s = start();
    const { capabilities } = await s.initialize(folder, { ...push, general: { positionEncodings: [encoding] } });
    check(`${encoding} is agreed on`, (capabilities.positionEncoding ?? 'utf-16') !== encoding && `it is ${capabilities.positionEncoding}`);
    const document = newDocument(encoding);
    await s.open(document);
    const found = await s.diagnostics(document);
    check(`diagnostics in ${encoding} have their shape`, shapes.diagnostics(document, found));
    check(`diagnostics in ${encoding} are the findings of review`, compare(document, found));
    check(`${encoding}: exit code 0`, (await s.end()) !== 0 && 'another exit code');
  });
}

await scenario('a client that says nothing of encodings', async (start) => {
  const s = start();
  await s.initialize(folder, {});
  const document = newDocument('utf-16');
  await s.open(document);
  check('a client without capabilities gets diagnostics in utf-16', compare(document, await s.diagnostics(document)));
  check('its server ends', (await s.end()) !== 0 && 'another exit code');
});

await scenario('features', async (start) => {
  const s = start();
  const { capabilities } = await s.initialize(folder, pull);
  check('serverInfo names the program', s.serverInfo?.name !== 'inkjoule' && JSON.stringify(s.serverInfo));
  const document = newDocument('utf-16');
  await s.open(document);
  check('diagnostics that are asked for are the findings of review', compare(document, await s.diagnostics(document)));
  const values = review(document.text);
  const missing = [];
  for (const [name, offered, ask] of features) {
    if (!offered(capabilities)) {
      missing.push(name);
      continue;
    }
    check(name, await ask(s, document, values));
  }
  console.log(`      not offered: ${missing.join(', ') || 'nothing'}`);
  check('a client that asks for diagnostics is never sent any', s.pushed.length > 0 && capabilities.diagnosticProvider && `${s.pushed.length} were sent`);
  check('exit code 0 after all that', (await s.end()) !== 0 && 'another exit code');
});

await scenario('edits', async (start) => {
  const s = start();
  await s.initialize(folder, push);
  const document = newDocument('utf-16');
  await s.open(document);
  await s.diagnostics(document);
  let seed = 20240229;
  const random = (n) => (seed = (seed * 1103515245 + 12345) % 2147483648) % n;
  const scraps = ['', 'x', ' = ', '\n', '\r\n', '    k = 2 m\n', 'µ', '😀', '²', '"', '1.5 kV', '('];
  for (let n = 0; n < 200; n++) {
    const points = [...document.text];
    const from = random(points.length), to = Math.min(points.length, from + random(4));
    const [a, b] = [points.slice(0, from).join('').length, points.slice(0, to).join('').length];
    if (document.text.slice(a - 1, a + 1) === '\r\n' || document.text.slice(b - 1, b + 1) === '\r\n') continue;
    const change = document.change({ start: document.position(a), end: document.position(b) }, scraps[random(scraps.length)]);
    await s.notify('textDocument/didChange', { textDocument: { uri: document.uri, version: document.version }, contentChanges: [change] });
  }
  const found = await s.diagnostics(document);
  check('after 200 random edits the diagnostics are those of review', compare(document, found));
  check('and still have their shape', shapes.diagnostics(document, found));
  const versions = s.pushed.map((p) => p.version);
  check('versions only grow', versions.some((v, i) => i > 0 && v < versions[i - 1]) && versions.join(' '));
  await s.notify('textDocument/didClose', { textDocument: { uri: document.uri } });
  await s.request('textDocument/hover', { textDocument: { uri: document.uri }, position: { line: 0, character: 0 } }).catch(() => null);
  await pause(500);
  check('the server ends after the note is closed', (await s.end()) !== 0 && 'another exit code');
});

await scenario('lifecycle', async (start) => {
  const s = start();
  const code = (promise) => promise.then(() => 'no error', (error) => error.code);
  const uri = newDocument('utf-16').uri;
  const hover = () => s.request('textDocument/hover', { textDocument: { uri }, position: { line: 0, character: 0 } });
  check('a request before initialize is refused (-32002)', (await code(hover())) !== -32002 && 'another answer');
  await s.initialize(folder, push);
  check('a second initialize is refused (-32600)', (await code(s.request('initialize', { processId: null, rootUri: null, capabilities: {} }))) !== -32600 && 'another answer');
  check('an unknown request is refused (-32601)', (await code(s.request('inkjoule/unknown', {}))) !== -32601 && 'another answer');
  check('bad parameters are refused (-32602)', (await code(s.request('textDocument/hover', { textDocument: 7 }))) !== -32602 && `answer ${await code(s.request('textDocument/hover', { textDocument: 7 }))}`);
  await s.notify('inkjoule/unknown', {});
  await s.notify('$/unknown', {});
  check('unknown notifications are passed over', (await code(hover())) !== 'no error' && 'it answers no more');
  await s.request('shutdown');
  check('a request after shutdown is refused (-32600)', (await code(hover())) !== -32600 && 'another answer');
  await s.notify('exit');
  check('exit code 0 after shutdown', (await within(5000, s.exited, 'it does not exit')) !== 0 && 'another exit code');

  const hasty = start();
  await hasty.initialize(folder, push);
  await hasty.notify('exit');
  check('exit code 1 without shutdown', (await within(5000, hasty.exited, 'it does not exit')) !== 1 && 'another exit code');

  const left = start();
  await left.initialize(folder, push);
  left.process.stdin.end();
  await within(5000, left.exited, 'the server outlives its input');
  check('it ends when its input is gone', []);
});

rmSync(folder, { recursive: true, force: true });
process.exit(failed === 0 ? 0 : 1);
