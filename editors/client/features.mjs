// Every feature of the protocol that a calculation note has a use for: its name, how
// the server offers it, and the request with the checks of its reply.
import * as shapes from './shapes.mjs';

const at = (document, position) => ({ textDocument: { uri: document.uri }, position });

/** A value that the note computes from others, and the place of its name. */
function computed(document, review) {
  const value = review.values.find((v) => !v.input && v.shown);
  const start = document.index({ line: value.line - 1, character: 0 });
  return { value, position: document.find(value.name, 0, start), start };
}

/** An input, and where another line uses it. */
function input(document, review) {
  const value = review.values.find((v) => v.input);
  const start = document.index({ line: value.line - 1, character: 0 });
  return { value, position: document.find(value.name, 0, start) };
}

export const features = [
  ['textDocument/hover', (c) => c.hoverProvider, async (s, d, r) => {
    const out = [];
    for (const value of r.values) {
      const position = d.find(value.name, 0, d.index({ line: value.line - 1, character: 0 }));
      const reply = await s.request('textDocument/hover', at(d, position));
      out.push(...shapes.hover(d, reply));
      const told = reply?.contents.value.replaceAll('\\', '').replaceAll('\u00a0', ' ');
      if (value.shown && !told?.includes(value.shown)) out.push(`hover of ${value.name} lacks ${value.shown}: ${told}`);
    }
    return out;
  }],
  ['textDocument/inlayHint', (c) => c.inlayHintProvider, async (s, d) =>
    shapes.inlayHints(d, await s.request('textDocument/inlayHint', { textDocument: { uri: d.uri }, range: d.whole() }))],
  ['textDocument/inlayHint of one line', (c) => c.inlayHintProvider, async (s, d, r) => {
    const { value } = computed(d, r);
    const line = value.line - 1;
    const range = { start: { line, character: 0 }, end: { line, character: d.measure(d.lines[line]) } };
    const list = await s.request('textDocument/inlayHint', { textDocument: { uri: d.uri }, range });
    return list.length === 1 && list[0].position.line === line ? [] : [`${list.length} hints in line ${line + 1}`];
  }],
  ['textDocument/documentSymbol', (c) => c.documentSymbolProvider, async (s, d) =>
    shapes.symbols(d, await s.request('textDocument/documentSymbol', { textDocument: { uri: d.uri } }))],
  ['workspace/symbol', (c) => c.workspaceSymbolProvider, async (s, d, r) => {
    const { value } = input(d, r);
    const list = await s.request('workspace/symbol', { query: value.name });
    return [...shapes.workspaceSymbols(list), !list.some((x) => x.name === value.name) && `${value.name} is not among them`].filter(Boolean);
  }],
  ['textDocument/codeAction', (c) => c.codeActionProvider, async (s, d) => {
    const diagnostics = await s.diagnostics(d);
    const out = [];
    for (const diagnostic of diagnostics) {
      const list = await s.request('textDocument/codeAction', { textDocument: { uri: d.uri }, range: diagnostic.range, context: { diagnostics: [diagnostic] } });
      out.push(...shapes.codeActions(d, list));
    }
    return out;
  }],
  ['source.fixAll', (c) => c.codeActionProvider?.codeActionKinds?.some((k) => k.startsWith('source.fixAll')), async (s, d) => {
    const ask = () => s.request('textDocument/codeAction', { textDocument: { uri: d.uri }, range: d.whole(), context: { diagnostics: [], only: ['source.fixAll'] } });
    return shapes.codeActions(d, await ask());
  }],
  ['textDocument/completion', (c) => c.completionProvider, async (s, d, r) => {
    const { start } = computed(d, r);
    return shapes.completion(d, await s.request('textDocument/completion', at(d, d.find('= ', 2, start))));
  }],
  ['textDocument/signatureHelp', (c) => c.signatureHelpProvider, async (s, d) =>
    shapes.signature(d, await s.request('textDocument/signatureHelp', at(d, d.find('ln(', 3))))],
  ['textDocument/definition', (c) => c.definitionProvider, async (s, d, r) => {
    const { value, position } = input(d, r);
    const use = d.find(value.name, 0, d.index(computed(d, r).position) + 1);
    const reply = await s.request('textDocument/definition', at(d, use));
    const line = [reply].flat()[0]?.range?.start.line ?? [reply].flat()[0]?.targetSelectionRange?.start.line;
    return [...shapes.locations(d, reply), line !== position.line && `${value.name} is defined in line ${position.line + 1}, not ${line + 1}`].filter(Boolean);
  }],
  ['textDocument/references', (c) => c.referencesProvider, async (s, d, r) => {
    const ask = (includeDeclaration) => s.request('textDocument/references', { ...at(d, input(d, r).position), context: { includeDeclaration } });
    const [all, uses] = [await ask(true), await ask(false)];
    return [...shapes.locations(d, all), all.length !== uses.length + 1 && `${all.length} with the definition, ${uses.length} without`].filter(Boolean);
  }],
  ['textDocument/documentHighlight', (c) => c.documentHighlightProvider, async (s, d, r) =>
    shapes.highlights(d, await s.request('textDocument/documentHighlight', at(d, input(d, r).position)))],
  ['textDocument/prepareRename', (c) => c.renameProvider?.prepareProvider, async (s, d, r) => {
    const reply = await s.request('textDocument/prepareRename', at(d, input(d, r).position));
    return shapes.range(d, reply?.range ?? reply, 'what is to be renamed');
  }],
  ['textDocument/rename', (c) => c.renameProvider, async (s, d, r) => {
    const edit = await s.request('textDocument/rename', { ...at(d, input(d, r).position), newName: 'renamed_value' });
    return shapes.workspaceEdit(d, edit);
  }],
  ['textDocument/foldingRange', (c) => c.foldingRangeProvider, async (s, d) =>
    shapes.folding(d, await s.request('textDocument/foldingRange', { textDocument: { uri: d.uri } }))],
  ['textDocument/selectionRange', (c) => c.selectionRangeProvider, async (s, d, r) => {
    const list = await s.request('textDocument/selectionRange', { textDocument: { uri: d.uri }, positions: [computed(d, r).position, { line: 0, character: 0 }] });
    return [...shapes.selection(d, list), list?.length !== 2 && `${list?.length} answers to two positions`].filter(Boolean);
  }],
  ['textDocument/documentLink', (c) => c.documentLinkProvider, async (s, d) =>
    shapes.links(d, (await s.request('textDocument/documentLink', { textDocument: { uri: d.uri } })) ?? [])],
  ['textDocument/semanticTokens/full', (c) => c.semanticTokensProvider?.full, async (s, d) =>
    shapes.semanticTokens(d, await s.request('textDocument/semanticTokens/full', { textDocument: { uri: d.uri } }), s.capabilities.semanticTokensProvider.legend)],
  ['textDocument/semanticTokens/range', (c) => c.semanticTokensProvider?.range, async (s, d) =>
    shapes.semanticTokens(d, await s.request('textDocument/semanticTokens/range', { textDocument: { uri: d.uri }, range: d.whole() }), s.capabilities.semanticTokensProvider.legend)],
  ['textDocument/prepareCallHierarchy', (c) => c.callHierarchyProvider, async (s, d, r) => {
    const items = await s.request('textDocument/prepareCallHierarchy', at(d, computed(d, r).position));
    const out = shapes.calls(d, items);
    const calls = items?.length ? await s.request('callHierarchy/outgoingCalls', { item: items[0] }) : null;
    return out.concat(calls?.length ? [] : ['a computed value depends on nothing']);
  }],
  ['textDocument/formatting', (c) => c.documentFormattingProvider, async (s, d) =>
    shapes.textEdits(d, (await s.request('textDocument/formatting', { textDocument: { uri: d.uri }, options: { tabSize: 4, insertSpaces: true } })) ?? [])],
  ['textDocument/rangeFormatting', (c) => c.documentRangeFormattingProvider, async (s, d) =>
    shapes.textEdits(d, (await s.request('textDocument/rangeFormatting', { textDocument: { uri: d.uri }, range: d.whole(), options: { tabSize: 4, insertSpaces: true } })) ?? [])],
  ['workspace/diagnostic', (c) => c.diagnosticProvider?.workspaceDiagnostics, async (s) => {
    const reply = await s.request('workspace/diagnostic', { previousResultIds: [] });
    return Array.isArray(reply?.items) ? [] : [`no items: ${JSON.stringify(reply)}`];
  }],
];
