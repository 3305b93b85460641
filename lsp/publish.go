package lsp

import (
	"encoding/json"
	"fmt"
	"hash/fnv"
	"slices"
	"strconv"
	"sync"

	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
	"spanwright/lsp/protocol"
	"spanwright/lsp/workspace"
)

// published knows how the client learns of diagnostics: they are pushed, until
// it pulls those of a document. A client that does both would show everything
// twice.
type published struct {
	mutex sync.Mutex
	// pushed holds the paths about which something was pushed that still stands.
	pushed map[string]bool
	// pulled holds the identity of the last report of documents that are pulled.
	pulled map[string]string
}

// closed forgets that a document was pulled.
func (p *published) closed(path string) {
	p.mutex.Lock()
	defer p.mutex.Unlock()
	delete(p.pulled, path)
}

// publish tells the client what there is to say about a file. The workspace
// calls it for one version after the other, never for an older one.
func (s *server) publish(snapshot *workspace.Snapshot, path string, list []diagnostic.Diagnostic) {
	items := s.diagnostics(snapshot, path, list)
	p := &s.published
	p.mutex.Lock()
	defer p.mutex.Unlock()
	if report, pulls := p.pulled[path]; pulls {
		if report != identityOf(items) {
			s.refresh(protocol.ServerWorkspaceDiagnosticRefresh)
		}
		return
	}
	s.push(snapshot, path, items)
}

// push sends diagnostics. The caller holds the lock.
func (s *server) push(snapshot *workspace.Snapshot, path string, items []protocol.Diagnostic) {
	params := protocol.PublishDiagnosticsParams{URI: s.buffers.uri(path), Diagnostics: items}
	if d, open := snapshot.Document(path); open {
		params.Version = &d.Version
	}
	s.connection.Notify(string(lsp.ServerTextDocumentPublishDiagnostics), params)
	p := &s.published
	if p.pushed == nil {
		p.pushed = map[string]bool{}
	}
	p.pushed[path] = len(items) > 0
}

// pulls notes that the client pulls a document's diagnostics. What was pushed
// about it is taken back.
func (s *server) pulls(snapshot *workspace.Snapshot, path, report string) {
	p := &s.published
	p.mutex.Lock()
	defer p.mutex.Unlock()
	if p.pushed[path] {
		s.push(snapshot, path, nil)
	}
	if _, open := s.workspace.Snapshot().Document(path); !open {
		return
	}
	if p.pulled == nil {
		p.pulled = map[string]string{}
	}
	p.pulled[path] = report
}

// mostDiagnostics bounds what is said about a file at once. Nobody reads
// further, and clients choke on a hundred thousand.
const mostDiagnostics = 1000

// shortened cuts a list that nobody reads, and says so in its last entry.
func shortened(list []diagnostic.Diagnostic) []diagnostic.Diagnostic {
	if len(list) <= mostDiagnostics {
		return list
	}
	last := list[mostDiagnostics-1]
	return append(slices.Clone(list[:mostDiagnostics-1]), diagnostic.Diagnostic{
		Severity: diagnostic.Information, File: last.File, Subject: last.Subject,
		Summary: fmt.Sprintf("From here on %d more messages about this file are not listed. Mend those above first.", len(list)-mostDiagnostics+1),
	})
}

// diagnostics turns diagnostics of a file into the protocol's.
func (s *server) diagnostics(snapshot *workspace.Snapshot, path string, list []diagnostic.Diagnostic) []protocol.Diagnostic {
	list = shortened(list)
	items := make([]protocol.Diagnostic, 0, len(list))
	tree, err := snapshot.Tree(path)
	if err != nil {
		tree = nil // of a file that is gone: everything stands at its start
	}
	for _, d := range list {
		item := protocol.Diagnostic{
			Severity: lsp.DiagnosticSeverity(d.Severity),
			Source:   "spanwright",
			Message:  d.Summary,
		}
		if d.Name != "" {
			item.Code = string(d.Name)
		}
		if tree != nil {
			item.Range = s.rangeOf(tree.File, visible(tree.File, d.Subject))
		}
		if d.Detail != "" {
			item.Message += "\n" + d.Detail
		}
		if d.Unnecessary && slices.Contains(s.client.DiagnosticTags, lsp.DiagnosticTagUnnecessary) {
			item.Tags = []lsp.DiagnosticTag{lsp.DiagnosticTagUnnecessary}
		}
		item.RelatedInformation = s.related(snapshot, d)
		items = append(items, item)
	}
	return items
}

// related returns the further places of a diagnostic, for a client that shows
// them.
func (s *server) related(snapshot *workspace.Snapshot, d diagnostic.Diagnostic) []lsp.DiagnosticRelatedInformation {
	if !s.client.RelatedInformation {
		return nil
	}
	var all []lsp.DiagnosticRelatedInformation
	for _, r := range d.Related {
		file := r.File
		if file == "" {
			file = d.File
		}
		if tree, err := snapshot.Tree(file); err == nil {
			all = append(all, lsp.DiagnosticRelatedInformation{Location: s.location(tree, r.Span), Message: r.Message})
		}
	}
	return all
}

// visible widens an empty span by one character, where the line has one, since
// many clients show nothing under an empty range.
func visible(file *source.File, span source.Span) source.Span {
	if !span.Empty() {
		return span
	}
	line := file.LineAt(span.Start)
	switch {
	case span.Start < file.LineEnd(line):
		span.End++
	case span.Start > file.LineStart(line):
		span.Start--
	}
	return span
}

// identityOf returns a short text that differs for lists that differ.
func identityOf(items []protocol.Diagnostic) string {
	text, err := json.Marshal(items)
	if err != nil {
		return ""
	}
	hash := fnv.New64a()
	hash.Write(text)
	return strconv.FormatUint(hash.Sum64(), 36)
}
