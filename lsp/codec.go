package lsp

import (
	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
)

// codec encodes what jsonrpc2 carries. The protocol's own encoder is needed
// because its unions are interfaces.
type codec struct{}

// Marshal implements jsonrpc2.Codec.
func (codec) Marshal(v any) ([]byte, error) {
	if raw, ok := v.(jsonrpc2.RawMessage); ok {
		return raw, nil
	}
	return protocol.Marshal(v)
}

// Unmarshal implements jsonrpc2.Codec. Strings may share one copy of data.
func (codec) Unmarshal(data []byte, v any) error {
	if raw, ok := v.(*jsonrpc2.RawMessage); ok {
		*raw = append(jsonrpc2.RawMessage(nil), data...)
		return nil
	}
	return protocol.Unmarshal(data, v)
}
