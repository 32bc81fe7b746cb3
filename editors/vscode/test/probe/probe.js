// Asks VS Code itself what it would show of the folder's note, and writes it to
// probe.json there. It works only in a folder that holds a probe-wanted.json:
//   {note, review}    file names; review is what `inkjoule review` printed
const vscode = require('vscode');
const fs = require('fs');
const path = require('path');

exports.activate = async () => {
  const folder = vscode.workspace.workspaceFolders?.[0]?.uri.fsPath;
  if (!folder || !fs.existsSync(path.join(folder, 'probe-wanted.json'))) return;
  const wanted = JSON.parse(fs.readFileSync(path.join(folder, 'probe-wanted.json'), 'utf8'));
  const out = { columns: 'utf-16', version: vscode.version };
  try {
    await probe(folder, wanted, out);
  } catch (error) {
    out.error = String(error?.stack ?? error);
  }
  const temporary = path.join(folder, 'probe.json.part');
  fs.writeFileSync(temporary, JSON.stringify(out, null, 1));
  fs.renameSync(temporary, path.join(folder, 'probe.json'));
};

async function probe(folder, wanted, out) {
  const review = JSON.parse(fs.readFileSync(path.join(folder, wanted.review), 'utf8')).notes[0];
  const document = await vscode.workspace.openTextDocument(path.join(folder, wanted.note));
  await vscode.window.showTextDocument(document);
  out.language = document.languageId;
  await settled(document, () => diagnostics(document).length > 0);
  out.diagnostics = diagnostics(document);
  out.related = vscode.languages.getDiagnostics(document.uri).flatMap((d) => (d.relatedInformation ?? []).map((r) => r.message));
  out.hints = await hints(document);
  out.hovers = await hovers(document, review);
  out.symbols = await symbols(document);
  out.completions = await completions(document, review);
  out.formatting = await formatting(document);
  out.rename = await rename(document, review);
  await switchHints(document, out);
  await applyFixes(folder, document, review, out);
}

/** Waits until the condition holds and the diagnostics have been still for a second. */
async function settled(document, holds) {
  const until = Date.now() + 20000;
  let last = '', since = Date.now();
  while (Date.now() < until) {
    const now = JSON.stringify(diagnostics(document));
    if (now !== last) [last, since] = [now, Date.now()];
    if (holds() && Date.now() - since > 1000) return;
    await pause(100);
  }
}

const pause = (ms) => new Promise((done) => setTimeout(done, ms));
const severities = ['error', 'caution', 'advice', 'advice'];

function diagnostics(document) {
  return vscode.languages.getDiagnostics(document.uri).map((d) => ({
    ...place(d.range),
    rule: typeof d.code === 'object' ? d.code.value : d.code,
    link: typeof d.code === 'object' ? d.code.target.toString() : undefined,
    severity: severities[d.severity],
    message: d.message,
  }));
}

function place(range) {
  return {
    line: range.start.line + 1, column: range.start.character + 1,
    endLine: range.end.line + 1, endColumn: range.end.character + 1,
  };
}

const run = (command, ...args) => vscode.commands.executeCommand(command, ...args);

function everything(document) {
  return new vscode.Range(0, 0, document.lineCount, 0);
}

async function hints(document) {
  const found = (await run('vscode.executeInlayHintProvider', document.uri, everything(document))) ?? [];
  return found.map((h) => ({
    line: h.position.line + 1,
    atEnd: h.position.character === document.lineAt(h.position.line).text.length,
    text: typeof h.label === 'string' ? h.label : h.label.map((part) => part.value).join(''),
  }));
}

/** Hovers over the name in each definition that review gives a value for. */
async function hovers(document, review) {
  const out = [];
  for (const value of review.values) {
    const at = document.lineAt(value.line - 1).text.indexOf(value.name);
    if (at < 0) continue;
    const found = await run('vscode.executeHoverProvider', document.uri, new vscode.Position(value.line - 1, at));
    out.push({ name: value.name, text: found.flatMap((h) => h.contents.map((c) => c.value ?? c)).join('\n') });
  }
  return out;
}

async function symbols(document) {
  const found = (await run('vscode.executeDocumentSymbolProvider', document.uri)) ?? [];
  const flat = (list) => list.flatMap((s) => [{ name: s.name, detail: s.detail, line: s.range.start.line + 1 }, ...flat(s.children ?? [])]);
  return flat(found);
}

/** Completion where the right side of the last computed definition begins. */
async function completions(document, review) {
  const value = review.values.filter((v) => !v.input).at(-1);
  const line = document.lineAt(value.line - 1).text;
  const at = new vscode.Position(value.line - 1, line.indexOf('=') + 2);
  const found = await run('vscode.executeCompletionItemProvider', document.uri, at);
  return (found?.items ?? []).map((i) => (typeof i.label === 'string' ? i.label : i.label.label));
}

async function formatting(document) {
  const edits = await run('vscode.executeFormatDocumentProvider', document.uri, { tabSize: 4, insertSpaces: true });
  return (edits ?? null)?.map((e) => ({ ...place(e.range), text: e.newText })) ?? null;
}

/** Renames the first input and gives the lines that would change; null without a provider. */
async function rename(document, review) {
  const value = review.values.find((v) => v.input);
  const at = new vscode.Position(value.line - 1, document.lineAt(value.line - 1).text.indexOf(value.name));
  try {
    const edit = await run('vscode.executeDocumentRenameProvider', document.uri, at, 'X_renamed');
    return edit.entries().flatMap(([, edits]) => edits.map((e) => e.range.start.line + 1));
  } catch (error) {
    return /No result|no provider/i.test(String(error)) ? null : String(error);
  }
}

/** The setting that hides the values must hide them, and show them again. */
async function switchHints(document, out) {
  const setting = vscode.workspace.getConfiguration('inkjoule');
  await setting.update('hints.results', false, vscode.ConfigurationTarget.Global);
  out.hintsOff = (await hints(document)).length;
  await setting.update('hints.results', undefined, vscode.ConfigurationTarget.Global);
  out.hintsOnAgain = (await hints(document)).length;
}

/** Applies the fix that review names for each finding, last finding first, and dumps what is then shown. */
async function applyFixes(folder, document, review, out) {
  out.fixes = [];
  for (const finding of [...review.findings].reverse()) {
    const d = vscode.languages.getDiagnostics(document.uri).find((x) =>
      x.range.start.line === finding.line - 1 && (x.code?.value ?? x.code) === finding.rule);
    if (!d) continue;
    const actions = (await run('vscode.executeCodeActionProvider', document.uri, d.range, 'quickfix', 50)) ?? [];
    const fix = finding.fix && actions.find((a) => a.edit && a.title === finding.fix);
    out.fixes.push({ rule: finding.rule, line: finding.line, titles: actions.map((a) => a.title), applied: fix?.title });
    if (fix) await vscode.workspace.applyEdit(fix.edit);
  }
  const before = JSON.stringify(out.diagnostics);
  if (out.fixes.some((f) => f.applied)) await settled(document, () => JSON.stringify(diagnostics(document)) !== before);
  out.after = { columns: 'utf-16', diagnostics: diagnostics(document), hints: await hints(document) };
  fs.writeFileSync(path.join(folder, 'fixed.joule'), document.getText());
}
