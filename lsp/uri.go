package lsp

import (
	"net/url"
	"path"
	"strings"
	"sync"
)

// pathOf returns the path by which the workspace knows a document: that of a
// file, slash-separated and clean, so that all spellings of its URI are one.
// A buffer that is no file goes by its whole URI.
func pathOf(uri string) string {
	u, err := url.Parse(uri)
	if err != nil || u.Scheme != "file" || u.Path == "" {
		return uri
	}
	p := u.Path
	if isDrive(strings.TrimPrefix(p, "/")) {
		p = strings.ToUpper(p[1:2]) + p[2:]
	} else if u.Host != "" && u.Host != "localhost" {
		return "//" + u.Host + path.Clean(p)
	}
	return path.Clean(p)
}

// uriOf returns the URI of a path that no client has named.
func uriOf(p string) string {
	switch {
	case strings.HasPrefix(p, "//"):
		host, rest, _ := strings.Cut(p[2:], "/")
		return (&url.URL{Scheme: "file", Host: host, Path: "/" + rest}).String()
	case strings.HasPrefix(p, "/"):
		return (&url.URL{Scheme: "file", Path: p}).String()
	case isDrive(p):
		return (&url.URL{Scheme: "file", Path: "/" + p}).String()
	}
	return p
}

// isDrive reports whether a path begins with the letter of a drive.
func isDrive(p string) bool {
	if len(p) < 2 || p[1] != ':' {
		return false
	}
	letter := p[0] | 0x20
	return 'a' <= letter && letter <= 'z' && (len(p) == 2 || p[2] == '/')
}

// buffers remembers how the client spells the URIs of what it has open: it
// knows its documents by them.
type buffers struct {
	mutex  sync.Mutex
	byPath map[string]string
}

func (b *buffers) open(path, uri string) {
	b.mutex.Lock()
	defer b.mutex.Unlock()
	if b.byPath == nil {
		b.byPath = map[string]string{}
	}
	b.byPath[path] = uri
}

// uri returns the URI of a path as the client spells it.
func (b *buffers) uri(path string) string {
	b.mutex.Lock()
	defer b.mutex.Unlock()
	if uri, ok := b.byPath[path]; ok {
		return uri
	}
	return uriOf(path)
}
