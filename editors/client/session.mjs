// One server process and a connection to it, by the protocol library that editors use.
import { spawn } from 'node:child_process';
import { createRequire } from 'node:module';
import path from 'node:path';
import { pathToFileURL } from 'node:url';

// The library lies in the cache folder, outside the repository (editors/setup.sh).
const require = createRequire(path.join(process.env.INKJOULE_CACHE, 'client', 'package.json'));
export const protocol = require('vscode-languageserver-protocol/node');
const { createMessageConnection, StreamMessageReader, StreamMessageWriter } = require('vscode-jsonrpc/node');

export class Session {
  constructor(program) {
    this.pushed = []; // every publishDiagnostics, in order
    this.asked = []; // every request of the server to us
    this.messages = []; // what the server wants to show to the user
    this.broken = []; // what is on standard output and is no message
    this.process = spawn(program, ['serve'], { stdio: ['pipe', 'pipe', 'pipe'] });
    this.log = '';
    this.process.stderr.on('data', (chunk) => (this.log += chunk));
    this.exited = new Promise((done) => this.process.on('exit', (code, signal) => done(code ?? signal)));
    const reader = new StreamMessageReader(this.process.stdout);
    reader.onError((error) => this.broken.push(String(error)));
    this.connection = createMessageConnection(reader, new StreamMessageWriter(this.process.stdin));
    this.connection.onError(([error]) => this.broken.push(String(error)));
    this.connection.onNotification('textDocument/publishDiagnostics', (p) => this.pushed.push(p));
    this.connection.onNotification('window/showMessage', (p) => this.messages.push(p));
    this.connection.onNotification(() => {}); // log messages, progress
    this.connection.onRequest((method, params) => {
      this.asked.push(method);
      return method === 'workspace/configuration' ? params.items.map(() => null) : null;
    });
    this.connection.listen();
  }

  request(method, params, token) {
    return token ? this.connection.sendRequest(method, params, token) : this.connection.sendRequest(method, params);
  }

  notify(method, params) {
    return this.connection.sendNotification(method, params);
  }

  async initialize(folder, capabilities) {
    const uri = pathToFileURL(folder).href;
    const result = await this.request('initialize', {
      processId: process.pid,
      clientInfo: { name: 'protocol check', version: '1' },
      rootUri: uri,
      workspaceFolders: [{ uri, name: path.basename(folder) }],
      capabilities,
    });
    this.capabilities = result.capabilities;
    this.serverInfo = result.serverInfo;
    await this.notify('initialized', {});
    return result;
  }

  open(document) {
    return this.notify('textDocument/didOpen', {
      textDocument: { uri: document.uri, languageId: 'joule', version: document.version, text: document.text },
    });
  }

  /** The diagnostics of the newest text: asked for where the server answers, else the last pushed. */
  async diagnostics(document) {
    if (this.capabilities.diagnosticProvider) {
      const report = await this.request('textDocument/diagnostic', { textDocument: { uri: document.uri } });
      return report.items;
    }
    const until = Date.now() + 15000;
    while (Date.now() < until) {
      const last = this.pushed.filter((p) => p.uri === document.uri).at(-1);
      if (last && (last.version === undefined || last.version === document.version)) return last.diagnostics;
      await pause(20);
    }
    throw new Error(`no diagnostics for version ${document.version} within 15 s`);
  }

  /** Shuts down in good order and gives the exit code. */
  async end() {
    await this.request('shutdown');
    await this.notify('exit');
    return within(5000, this.exited, 'the server does not exit');
  }

  kill() {
    this.process.kill('SIGKILL');
  }
}

export const pause = (ms) => new Promise((done) => setTimeout(done, ms));

export function within(ms, promise, message) {
  let timer;
  const late = new Promise((_, fail) => (timer = setTimeout(() => fail(new Error(`${message} within ${ms} ms`)), ms)));
  return Promise.race([promise, late]).finally(() => clearTimeout(timer));
}
