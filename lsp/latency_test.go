package lsp

import (
	"bufio"
	"bytes"
	"context"
	"encoding/json"
	"fmt"
	"io"
	"log/slog"
	"net"
	"net/textproto"
	"slices"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/require"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/generate"
	"spanwright/lang/source"
	"spanwright/lsp/protocol"
	"spanwright/lsp/workspace"
)

// stopwatch is a client that spends as little time as can be, so that what is
// measured is the server and the way of the bytes.
type stopwatch struct {
	b       *testing.B
	conn    net.Conn
	in      *bufio.Reader
	file    *source.File
	version int
	asked   int
	answers map[int]chan []byte
	asks    chan asking
	solved  chan struct{} // a token for each refresh of the hints
}

type asking struct {
	id     int
	answer chan []byte
}

func watch(b *testing.B, text string) *stopwatch {
	near, far := net.Pipe()
	s := &stopwatch{b: b, conn: near, in: bufio.NewReaderSize(near, 1<<20), file: source.New(uri, text), version: 1,
		answers: map[int]chan []byte{}, asks: make(chan asking, 100), solved: make(chan struct{}, 1000)}
	ended := make(chan int, 1)
	go func() {
		ended <- Serve(context.Background(), far, Options{Log: slog.New(slog.DiscardHandler), Pace: workspace.DefaultOptions()})
	}()
	go s.read()
	s.request("initialize", map[string]any{"capabilities": map[string]any{
		"workspace": map[string]any{"inlayHint": map[string]any{"refreshSupport": true}}}})
	s.send(map[string]any{"method": "initialized", "params": map[string]any{}})
	s.send(map[string]any{"method": "textDocument/didOpen", "params": map[string]any{"textDocument": map[string]any{
		"uri": uri, "languageId": "span", "version": 1, "text": text}}})
	b.Cleanup(func() {
		near.Close()
		<-ended
	})
	return s
}

func (s *stopwatch) send(message map[string]any) {
	message["jsonrpc"] = "2.0"
	body, err := json.Marshal(message)
	require.NoError(s.b, err)
	_, err = s.conn.Write(fmt.Appendf(nil, "Content-Length: %d\r\n\r\n%s", len(body), body))
	require.NoError(s.b, err)
}

// read hands each answer to who waits for it, and answers refreshes.
func (s *stopwatch) read() {
	reader := textproto.NewReader(s.in)
	for {
		header, err := reader.ReadMIMEHeader()
		if err != nil {
			return
		}
		length, _ := strconv.Atoi(header.Get("Content-Length"))
		body := make([]byte, length)
		if _, err := io.ReadFull(s.in, body); err != nil {
			return
		}
		for len(s.asks) > 0 {
			a := <-s.asks
			s.answers[a.id] = a.answer
		}
		var id int
		switch {
		case bytes.Contains(body[:min(len(body), 200)], []byte(protocol.ServerWorkspaceInlayHintRefresh)):
			var message struct{ ID json.RawMessage }
			json.Unmarshal(body, &message)
			body := fmt.Sprintf(`{"jsonrpc":"2.0","id":%s,"result":null}`, message.ID)
			go fmt.Fprintf(s.conn, "Content-Length: %d\r\n\r\n%s", len(body), body)
			s.solved <- struct{}{}
		default:
			if _, err := fmt.Sscanf(string(body[:min(len(body), 60)]), `{"jsonrpc":"2.0","id":%d`, &id); err == nil {
				s.answers[id] <- body
				delete(s.answers, id)
			}
		}
	}
}

// request sends a request and returns the answer and the time it took.
func (s *stopwatch) request(method string, params map[string]any) (answer []byte, took time.Duration) {
	s.asked++
	a := asking{s.asked, make(chan []byte, 1)}
	s.asks <- a
	start := time.Now()
	s.send(map[string]any{"id": s.asked, "method": method, "params": params})
	answer = <-a.answer
	took = time.Since(start)
	require.NotContains(s.b, string(answer[:min(len(answer), 60)]), `"error"`, "%s", answer)
	return answer, took
}

// replace types: it puts one text in the place of another.
func (s *stopwatch) replace(from, to string) {
	start := strings.Index(s.file.Text, from)
	require.GreaterOrEqual(s.b, start, 0)
	change := map[string]any{"range": s.rangeOf(start, start+len(from)), "text": to}
	text, err := source.Apply(s.file.Text, []source.Edit{{Span: source.Span{Start: start, End: start + len(from)}, New: to}})
	require.NoError(s.b, err)
	s.file = source.New(uri, text)
	s.version++
	s.send(map[string]any{"method": "textDocument/didChange", "params": map[string]any{
		"textDocument": map[string]any{"uri": uri, "version": s.version}, "contentChanges": []any{change}}})
}

func (s *stopwatch) rangeOf(start, end int) lsp.Range {
	at := func(offset int) lsp.Position {
		p := s.file.Point(offset, source.UTF16)
		return lsp.Position{Line: uint32(p.Line), Character: uint32(p.Character)}
	}
	return lsp.Range{Start: at(start), End: at(end)}
}

// hints asks for the hints of a screenful, and reports whether they belong to
// this version.
func (s *stopwatch) hints() (current bool, took time.Duration) {
	answer, took := s.request("textDocument/inlayHint", s.screen())
	return bytes.Contains(answer, []byte("this version")), took
}

// screen is a screenful of lines about the middle of the model.
func (s *stopwatch) screen() map[string]any {
	line := uint32(s.file.Lines() / 2)
	return map[string]any{"textDocument": map[string]any{"uri": uri}, "range": lsp.Range{
		Start: lsp.Position{Line: line}, End: lsp.Position{Line: line + 60}}}
}

// settled waits until the hints belong to this version.
func (s *stopwatch) settled() {
	for {
		if current, _ := s.hints(); current {
			return
		}
		<-s.solved
	}
}

// report reports the median and the 99th percentile of what was measured.
func report(b *testing.B, took []time.Duration) {
	slices.Sort(took)
	at := func(share float64) float64 {
		return float64(took[min(len(took)-1, int(share*float64(len(took))))]) / float64(time.Millisecond)
	}
	b.ReportMetric(at(0.5), "p50-ms")
	b.ReportMetric(at(0.99), "p99-ms")
}

var buildings = []generate.Building{generate.Hundred, generate.Thousand, generate.TenThousand}

// BenchmarkReactions measures from a keystroke to the new numbers in the
// client's hands: the change, the solve, the refresh and the hints.
//
// Aims: 60 ms for a space frame of 1,000 members, 500 ms for 10,000.
func BenchmarkReactions(b *testing.B) {
	for _, building := range buildings {
		b.Run(strconv.Itoa(building.Members()), func(b *testing.B) {
			s := watch(b, building.Text())
			s.settled()
			loads := []string{generate.LoadToEdit, "8 kN/m down"}
			var took []time.Duration
			for b.Loop() {
				start := time.Now()
				s.replace(loads[len(took)%2], loads[1-len(took)%2])
				s.settled()
				took = append(took, time.Since(start))
			}
			report(b, took)
		})
	}
}

// BenchmarkWhileSolving measures what the user waits for while a solve is
// running: each request follows a keystroke.
//
// Aim: below 10 ms at the 99th percentile for 10,000 members.
func BenchmarkWhileSolving(b *testing.B) {
	requests := []struct {
		name   string
		params func(s *stopwatch) (method string, params map[string]any)
	}{
		{"hover", func(s *stopwatch) (string, map[string]any) {
			return "textDocument/hover", s.place("support n0_1_1")
		}},
		{"completion", func(s *stopwatch) (string, map[string]any) {
			return "textDocument/completion", s.place("beam c1_1_1 = n0_1_1 -> ")
		}},
		{"hints", func(s *stopwatch) (string, map[string]any) { return "textDocument/inlayHint", s.screen() }},
		{"tokens", func(s *stopwatch) (string, map[string]any) { return "textDocument/semanticTokens/range", s.screen() }},
	}
	for _, building := range buildings {
		for _, request := range requests {
			b.Run(fmt.Sprintf("%d/%s", building.Members(), request.name), func(b *testing.B) {
				s := watch(b, building.Text())
				s.settled()
				sections := []string{generate.SectionToEdit, "rect 110 x 200 mm"}
				var all []time.Duration
				for b.Loop() {
					s.replace(sections[len(all)%2], sections[1-len(all)%2])
					method, params := request.params(s)
					_, took := s.request(method, params)
					all = append(all, took)
				}
				report(b, all)
			})
		}
	}
}

// place is the place at the end of a text.
func (s *stopwatch) place(text string) map[string]any {
	end := strings.Index(s.file.Text, text) + len(text)
	return map[string]any{"textDocument": map[string]any{"uri": uri}, "position": s.rangeOf(end, end).Start}
}
