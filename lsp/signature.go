package lsp

import (
	"context"
	"strings"

	"go.lsp.dev/protocol"

	"inkjoule/lang"
)

// signatures show how the function whose parentheses the cursor stands in is
// written.
func signatures() feature {
	return feature{
		offer: func(_ *client, to *protocol.ServerCapabilities) {
			to.SignatureHelpProvider = &protocol.SignatureHelpOptions{TriggerCharacters: []string{"(", ","}, RetriggerCharacters: []string{")"}}
		},
		methods: map[string]method{protocol.MethodTextDocumentSignatureHelp: request(signatureHelp)},
	}
}

// signatureParams are SignatureHelpParams without the context, which repeats
// the last reply.
type signatureParams struct {
	protocol.TextDocumentPositionParams
}

func signatureHelp(ctx context.Context, v *view, p *signatureParams) (any, error) {
	s, err := v.spot(ctx, p.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	c, ok := s.cursor()
	if !ok {
		return (*protocol.SignatureHelp)(nil), nil
	}
	name, argument := callAround(c.line)
	sig, ok := signatureOf(name)
	if own, found := ownSignature(s.note.Lookup(lang.CanonicalName(name))); found {
		sig, ok = own, true
	}
	if !ok {
		return (*protocol.SignatureHelp)(nil), nil
	}
	return v.signatureHelp(sig, argument), nil
}

func (v *view) signatureHelp(sig signature, argument int) *protocol.SignatureHelp {
	active := protocol.NewNullable(uint32(min(argument, max(0, len(sig.params)-1))))
	info := protocol.SignatureInformation{Label: sig.label()}
	if sig.doc != "" {
		doc := card{parts: []part{{text: sig.doc}}}
		info.Documentation = doc.content(v.client.markdown("textDocument.signatureHelp.signatureInformation.documentationFormat"))
	}
	at := len([]rune(sig.name)) + 1 // names have no code point beyond 16 bits
	for _, p := range sig.params {
		n := len([]rune(p))
		var label protocol.ParameterInformationLabel = protocol.String(p)
		if v.client.can("textDocument.signatureHelp.signatureInformation.parameterInformation.labelOffsetSupport") {
			label = protocol.ParameterInformationLabelTuple{uint32(at), uint32(at + n)}
		}
		info.Parameters = append(info.Parameters, protocol.ParameterInformation{Label: label})
		at += n + len(", ")
	}
	return &protocol.SignatureHelp{Signatures: []protocol.SignatureInformation{info}, ActiveSignature: ptr(uint32(0)), ActiveParameter: active}
}

// callAround finds the innermost call that is open at the end of a text: its
// name and the number of arguments before. The name is "" where there is none.
func callAround(line string) (name string, argument int) {
	type open struct {
		name string
		n    int
	}
	var stack []open
	quoted := false
	for i, r := range line {
		switch {
		case r == '"':
			quoted = !quoted
		case quoted:
		case r == '(':
			head := line[:i]
			stack = append(stack, open{name: head[wordStart(head):]})
		case r == ')' && len(stack) > 0:
			stack = stack[:len(stack)-1]
		case r == ',' && len(stack) > 0:
			stack[len(stack)-1].n++
		}
	}
	for i := len(stack) - 1; i >= 0; i-- {
		if stack[i].name != "" && !strings.ContainsAny(stack[i].name[:1], "0123456789") {
			return stack[i].name, stack[i].n
		}
	}
	return "", 0
}
