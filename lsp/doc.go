// Package lsp is the language server: an analysed note on one side, an editor
// on the other.
//
// # Flow
//
//	editor ─ frames ─► jsonrpc2 ─► server.handle ─► session (documents) ─► snapshot ─► feature
//
// One goroutine reads messages in order. Notifications, initialize and
// shutdown are handled on it, so that an edit is complete before the next
// message is looked at. Every other request takes an immutable view of the
// session on that goroutine and then runs beside it, so that a slow request
// never delays an edit and an edit never changes what a request sees.
//
// # Invariants
//
//   - A snapshot never changes. An edit makes a new one and cancels the work on
//     the one before. Its note comes first, its findings after that: most
//     requests wait for the note alone.
//   - Offsets are bytes everywhere; only mapper.go knows what a column is.
//   - A diagnostic is never sent for a text older than the newest one received.
//   - A client has one channel of diagnostics: it pulls them, or they are pushed.
//   - Nothing is written to the output but frames; what goes wrong is logged.
//   - A request is answered exactly once, whatever happens in its handler.
//   - What a client can do is asked through client.go, which survives every
//     absent capability.
//
// A feature is one file and one line in features.go.
package lsp
