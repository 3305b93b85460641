package lsp

import (
	"strconv"
	"sync"

	lsp "github.com/tliron/glsp/protocol_3_16"
)

// perToken is the number of integers that the protocol spends on a token.
const perToken = 5

// tokenCache keeps the tokens that a client holds of each document, so that
// after an edit only the difference is sent.
type tokenCache struct {
	mutex  sync.Mutex
	next   int
	byPath map[string]heldTokens
}

type heldTokens struct {
	identity string
	data     []uint32
}

// hold keeps the tokens that are being sent and returns their identity.
func (c *tokenCache) hold(path string, data []uint32) (identity string) {
	c.mutex.Lock()
	defer c.mutex.Unlock()
	c.next++
	identity = strconv.Itoa(c.next)
	if c.byPath == nil {
		c.byPath = map[string]heldTokens{}
	}
	c.byPath[path] = heldTokens{identity, data}
	return identity
}

// held returns the tokens of an identity, if they are the document's last ones.
func (c *tokenCache) held(path, identity string) ([]uint32, bool) {
	c.mutex.Lock()
	defer c.mutex.Unlock()
	h, ok := c.byPath[path]
	return h.data, ok && h.identity == identity
}

// drop forgets a document.
func (c *tokenCache) drop(path string) {
	c.mutex.Lock()
	defer c.mutex.Unlock()
	delete(c.byPath, path)
}

// tokenEdits returns what makes the tokens before into those after: one edit
// between what both have in common at their starts and at their ends, or none.
// Whole tokens are compared: each is relative to the one before it, so an edit
// of the text leaves all but a few as they are.
func tokenEdits(before, after []uint32) []lsp.SemanticTokensEdit {
	short := min(len(before), len(after))
	start := 0
	for start < short && before[start] == after[start] {
		start++
	}
	start -= start % perToken
	end := 0
	for end < short-start && before[len(before)-1-end] == after[len(after)-1-end] {
		end++
	}
	end -= end % perToken
	removed, added := len(before)-start-end, after[start:len(after)-end]
	if removed == 0 && len(added) == 0 {
		return []lsp.SemanticTokensEdit{}
	}
	return []lsp.SemanticTokensEdit{{Start: uint32(start), DeleteCount: uint32(removed), Data: added}}
}
