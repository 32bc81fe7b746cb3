// What a reply must look like. Each function gives a list of complaints.
import { protocol } from './session.mjs';

const { Diagnostic, DocumentSymbol, FoldingRange, InlayHint, Location, Range, SelectionRange, TextEdit, WorkspaceEdit } = protocol;

/** A range must lie in the document, forwards, and never inside a character. */
export function range(document, r, what = 'range') {
  if (!Range.is(r)) return [`${what} is no range: ${JSON.stringify(r)}`];
  const [from, to] = [document.index(r.start), document.index(r.end)];
  if (Number.isNaN(from) || Number.isNaN(to)) return [`${what} is outside the text: ${JSON.stringify(r)}`];
  return from <= to ? [] : [`${what} runs backwards: ${JSON.stringify(r)}`];
}

export const each = (list, what, check) =>
  Array.isArray(list) ? list.flatMap((item) => check(item)) : [`${what} is no list: ${JSON.stringify(list)?.slice(0, 120)}`];

const need = (good, complaint) => (good ? [] : [complaint]);

export const diagnostics = (document, list) => each(list, 'diagnostics', (d) => [
  ...need(Diagnostic.is(d), `no diagnostic: ${JSON.stringify(d)}`),
  ...need(d.source === 'inkjoule', `source is ${d.source}`),
  ...need(typeof d.code === 'string' && d.code !== '', `no rule in code: ${JSON.stringify(d.code)}`),
  ...need(d.message.includes(d.code), `the message does not name its rule ${d.code}: ${d.message}`),
  ...need([1, 2, 3, 4].includes(d.severity), `severity ${d.severity}`),
  ...need(d.codeDescription === undefined || typeof d.codeDescription.href === 'string', 'codeDescription without href'),
  ...range(document, d.range, `range of ${d.code}`),
  ...(d.relatedInformation ?? []).flatMap((r) => [
    ...need(Location.is(r.location) && r.message !== '', `bad related information: ${JSON.stringify(r)}`),
    ...(r.location.uri === document.uri ? range(document, r.location.range, 'related range') : []),
  ]),
]);

export const hover = (document, h) => h === null ? ['no hover'] : [
  ...need(['markdown', 'plaintext'].includes(h.contents?.kind), `contents are ${JSON.stringify(h.contents)}`),
  ...need(h.contents?.value !== '', 'empty hover'),
  ...(h.range ? range(document, h.range, 'hover range') : []),
];

export const inlayHints = (document, list) => each(list, 'inlay hints', (h) => [
  ...need(InlayHint.is(h), `no inlay hint: ${JSON.stringify(h)}`),
  ...range(document, { start: h.position, end: h.position }, 'hint position'),
  ...need(/^\s*(#.*)?$/.test(document.text.slice(document.index(h.position)).split(/[\r\n]/, 1)[0]), `a hint within line ${h.position.line + 1}`),
]);

export function symbols(document, list) {
  return each(list, 'symbols', (s) => [
    ...need(DocumentSymbol.is(s), `no document symbol: ${JSON.stringify(s)?.slice(0, 200)}`),
    ...range(document, s.range, `range of ${s.name}`),
    ...range(document, s.selectionRange, `selection range of ${s.name}`),
    ...need(document.index(s.range.start) <= document.index(s.selectionRange.start)
      && document.index(s.selectionRange.end) <= document.index(s.range.end), `selection range of ${s.name} is outside its range`),
    ...symbols(document, s.children ?? []),
  ]);
}

export const workspaceSymbols = (list) => each(list, 'workspace symbols', (s) =>
  need(typeof s.name === 'string' && typeof s.kind === 'number' && typeof s.location?.uri === 'string', `no symbol: ${JSON.stringify(s)}`));

export const locations = (document, list) => each([list].flat(), 'locations', (l) => {
  const [uri, r] = l?.targetUri ? [l.targetUri, l.targetSelectionRange] : [l?.uri, l?.range];
  return [...need(typeof uri === 'string', `no location: ${JSON.stringify(l)}`), ...(uri === document.uri ? range(document, r, 'location') : [])];
});

export const textEdits = (document, list) => each(list, 'text edits', (e) => [
  ...need(TextEdit.is(e), `no text edit: ${JSON.stringify(e)}`),
  ...range(document, e.range, 'edit'),
]);

export function workspaceEdit(document, edit) {
  if (!WorkspaceEdit.is(edit)) return [`no workspace edit: ${JSON.stringify(edit)}`];
  const changes = editsOf(document, edit);
  return [...need(changes.length > 0, 'the edit changes nothing here'), ...textEdits(document, changes)];
}

/** The edits of a workspace edit that belong to the document. */
export function editsOf(document, edit) {
  const versioned = (edit.documentChanges ?? []).filter((c) => c.textDocument?.uri === document.uri).flatMap((c) => c.edits);
  return versioned.concat(edit.changes?.[document.uri] ?? []);
}

export function completion(document, reply) {
  const items = Array.isArray(reply) ? reply : reply?.items;
  return each(items, 'completion', (i) => [
    ...need(typeof i.label === 'string' && i.label !== '', 'item without label'),
    ...need(i.textEdit !== undefined || reply.itemDefaults?.editRange !== undefined, `'${i.label}' has no text edit`),
    ...(i.textEdit?.range ? range(document, i.textEdit.range, `edit of '${i.label}'`) : []),
    ...need(i.insertTextFormat !== 2, `'${i.label}' is a snippet, which this client does not support`),
  ]).concat(need(items?.length > 0, 'nothing is offered'));
}

export const signature = (_, reply) => reply === null ? ['no signature'] : [
  ...need(reply.signatures?.length > 0 && reply.signatures.every((s) => typeof s.label === 'string'), `no signatures: ${JSON.stringify(reply)}`),
];

export function semanticTokens(document, reply, legend) {
  const data = reply?.data;
  if (!Array.isArray(data) || data.length % 5 !== 0) return [`data of length ${data?.length}`];
  let line = 0, character = 0;
  const out = [];
  for (let i = 0; i < data.length; i += 5) {
    const [down, right, length, type, modifiers] = data.slice(i, i + 5);
    [line, character] = down === 0 ? [line, character + right] : [line + down, right];
    out.push(...range(document, { start: { line, character }, end: { line, character: character + length } }, 'token'));
    out.push(...need(type < legend.tokenTypes.length, `token type ${type} is not in the legend`));
    out.push(...need(modifiers < 2 ** legend.tokenModifiers.length, `modifiers ${modifiers} are not in the legend`));
    out.push(...need(length > 0, 'empty token'), ...need(i === 0 || down > 0 || right > 0, 'tokens out of order'));
  }
  return out;
}

export const folding = (document, list) => each(list, 'folding ranges', (f) => [
  ...need(FoldingRange.is(f), `no folding range: ${JSON.stringify(f)}`),
  ...need(f.startLine <= f.endLine && f.endLine < document.lines.length, `folds lines ${f.startLine} to ${f.endLine}`),
]);

export const selection = (document, list) => each(list, 'selection ranges', (s) => {
  const out = need(SelectionRange.is(s), `no selection range: ${JSON.stringify(s)}`);
  for (let inner = s; inner; inner = inner.parent) {
    out.push(...range(document, inner.range, 'selection range'));
    if (inner.parent) {
      out.push(...need(document.index(inner.parent.range.start) <= document.index(inner.range.start)
        && document.index(inner.range.end) <= document.index(inner.parent.range.end), 'a parent that does not hold its child'));
    }
  }
  return out;
});

export const links = (document, list) => each(list, 'document links', (l) => range(document, l.range, 'link'));

export const highlights = (document, list) => each(list, 'highlights', (h) => range(document, h.range, 'highlight'));

export const codeActions = (document, list) => each(list, 'code actions', (a) => [
  ...need(typeof a.title === 'string' && a.title !== '', 'action without title'),
  ...need(typeof a.kind === 'string', `'${a.title}' has no kind`),
  ...need(a.edit || a.command || a.data !== undefined, `'${a.title}' does nothing`),
  ...(a.edit ? workspaceEdit(document, a.edit) : []),
]);

export const calls = (document, list) => each(list, 'call hierarchy', (i) => [
  ...need(typeof i.name === 'string' && typeof i.kind === 'number' && typeof i.uri === 'string', `no item: ${JSON.stringify(i)}`),
  ...range(document, i.range, 'item'), ...range(document, i.selectionRange, 'item selection'),
]);
