// The VS Code side of inkjoule: starts the language server and lets the user
// say where it is, whether values are shown, and how much is traced. What is
// found in a note is the server's business alone.
const vscode = require('vscode');
const { LanguageClient, State, TransportKind } = require('vscode-languageclient/node');

let client;
let starting = Promise.resolve();

/** Starts the server; called by VS Code when the first note is opened. */
async function activate(context) {
  context.subscriptions.push(
    vscode.commands.registerCommand('inkjoule.restart', () => inTurn(restart)),
    vscode.workspace.onDidChangeConfiguration((change) => {
      if (change.affectsConfiguration('inkjoule.server')) inTurn(restart);
      if (change.affectsConfiguration('inkjoule.hints')) refreshHints();
    })
  );
  await inTurn(start);
}

async function deactivate() {
  await inTurn(stop);
}

/** Runs one start or stop after the other, never two at a time. */
function inTurn(step) {
  starting = starting.then(step, step);
  return starting;
}

async function restart() {
  await stop();
  await start();
}

async function stop() {
  const old = client;
  client = undefined;
  if (old && old.state !== State.Stopped) await old.stop().catch(() => {});
}

async function start() {
  const command = setting('server.path') || 'inkjoule';
  const server = { command, args: ['serve'], transport: TransportKind.stdio };
  client = new LanguageClient('inkjoule', 'inkjoule', server, {
    documentSelector: [
      { scheme: 'file', language: 'joule' },
      { scheme: 'untitled', language: 'joule' },
    ],
    middleware: { provideInlayHints, handleDiagnostics, provideDiagnostics },
    initializationFailedHandler: () => false,
  });
  try {
    await client.start();
  } catch (error) {
    client = undefined;
    tellNotStarted(command, error);
  }
}

/** Values at line ends, unless the user switched them off. */
function provideInlayHints(document, range, token, next) {
  return setting('hints.results', document) === false ? [] : next(document, range, token);
}

/** Diagnostics that the server sends by itself. */
function handleDiagnostics(uri, diagnostics, next) {
  diagnostics.forEach(nameRuleOnce);
  next(uri, diagnostics);
}

/** Diagnostics that VS Code asks for. */
async function provideDiagnostics(document, previousResultId, token, next) {
  const report = await next(document, previousResultId, token);
  if (report?.kind === 'full') report.items.forEach(nameRuleOnce);
  return report;
}

/** The server ends a message's first line with the rule's name, which VS Code shows beside each message anyway. */
function nameRuleOnce(diagnostic) {
  const rule = diagnostic.code?.value ?? diagnostic.code;
  diagnostic.message = diagnostic.message.replace(` [${rule}]`, '');
}

function refreshHints() {
  for (const document of vscode.workspace.textDocuments) {
    if (document.languageId !== 'joule') continue;
    const provider = client?.getFeature('textDocument/inlayHint')?.getProvider(document);
    provider?.onDidChangeInlayHints.fire();
  }
}

function setting(name, scope) {
  return vscode.workspace.getConfiguration('inkjoule', scope).get(name);
}

async function tellNotStarted(command, error) {
  const missing = /ENOENT/.test(String(error));
  const message = missing
    ? `The program '${command}' was not found, so notes are not checked. Install inkjoule, or tell where it is.`
    : `'${command} serve' did not start, so notes are not checked: ${error?.message ?? error}`;
  const choice = await vscode.window.showErrorMessage(message, 'Open settings', 'Try again');
  if (choice === 'Open settings') {
    await vscode.commands.executeCommand('workbench.action.openSettings', 'inkjoule.server.path');
  } else if (choice === 'Try again') {
    await inTurn(restart);
  }
}

module.exports = { activate, deactivate };
