package rpc

import (
	"bufio"
	"bytes"
	"fmt"
	"io"
	"strconv"
	"strings"

	"github.com/sourcegraph/jsonrpc2"
)

const (
	// maxMessage bounds the body of one message. It leaves room for whole
	// documents of tens of megabytes.
	maxMessage = 64 << 20
	// maxSkipped bounds the body that is passed over because it is larger than
	// maxMessage. A length beyond it is taken for a mistake.
	maxSkipped = 1 << 30
	// maxHeaderLine bounds what is kept of a header line: its end.
	maxHeaderLine = 8 << 10
)

// frameReader cuts the input into the bodies of messages. It reads what the
// protocol prescribes and what clients get wrong: header names in any case, no
// blank after the colon, lines that end with a mere line feed.
//
// Where headers make no sense it reports one [refusal], then looks for the next
// Content-Length, wherever on a line that stands, and goes on from there.
type frameReader struct {
	in *bufio.Reader
	// length is the Content-Length of the header being read, −1 if there was none.
	length int64
	// inHeader is set while lines of a header have been read.
	inHeader bool
	// skip is the number of bytes to pass over before the next header.
	skip int64
	// lost is set from a mistake to the next good message: what is read
	// meanwhile follows from the mistake and is not reported again.
	lost bool
}

func newFrameReader(in io.Reader) *frameReader {
	return &frameReader{in: bufio.NewReaderSize(in, 64<<10), length: -1}
}

// next returns the next body. A *refusal is a mistake of the client, behind
// which reading can go on; any other error is the end of the input.
func (f *frameReader) next() ([]byte, error) {
	if f.skip > 0 {
		skip := f.skip
		f.skip = 0
		if _, err := io.CopyN(io.Discard, f.in, skip); err != nil {
			return nil, err
		}
	}
	for {
		line, err := f.line()
		if err != nil {
			return nil, err
		}
		if line != "" {
			if err := f.header(line); err != nil {
				return nil, err
			}
			continue
		}
		length, inHeader := f.length, f.inHeader
		f.length, f.inHeader = -1, false
		switch {
		case length > maxMessage:
			// Answered before the body is passed over, however long it takes.
			f.skip = length
			return nil, &refusal{code: jsonrpc2.CodeInvalidRequest,
				message: fmt.Sprintf("a message of %d bytes is longer than the %d that are read", length, maxMessage)}
		case length >= 0:
			return f.body(length)
		case inHeader:
			if err := f.lose("a header has no Content-Length"); err != nil {
				return nil, err
			}
		}
	}
}

// body reads a body. It grows with what arrives, not with what was announced.
func (f *frameReader) body(length int64) ([]byte, error) {
	var body bytes.Buffer
	body.Grow(int(min(length, 64<<10)) + bytes.MinRead)
	if _, err := io.CopyN(&body, f.in, length); err != nil {
		return nil, io.ErrUnexpectedEOF
	}
	return body.Bytes(), nil
}

// header takes in one line of a header.
func (f *frameReader) header(line string) error {
	f.inHeader = true
	before, value, found := cutLength(line)
	if !found {
		name, _, colon := strings.Cut(line, ":")
		if colon && isHeaderName(name) {
			return nil
		}
		return f.lose("what should be a header is none")
	}
	length, err := strconv.ParseInt(value, 10, 64)
	if err != nil || length < 0 || length > maxSkipped {
		f.length, f.inHeader = -1, false
		return f.lose("a Content-Length is not a length")
	}
	f.length = length
	if before != "" {
		return f.lose("something stands before a header")
	}
	return nil
}

// lose says once that the input makes no sense here.
func (f *frameReader) lose(message string) error {
	if f.lost {
		return nil
	}
	f.lost = true
	return &refusal{code: jsonrpc2.CodeParseError, message: message}
}

// line reads a header line without its line end. Of a very long one only the
// end is kept, where the next header may stand.
func (f *frameReader) line() (string, error) {
	var line []byte
	for {
		part, err := f.in.ReadSlice('\n')
		line = append(line, part...)
		if len(line) > maxHeaderLine {
			line = append([]byte(nil), line[len(line)-maxHeaderLine:]...)
		}
		switch err {
		case nil:
			return strings.TrimRight(string(line), "\r\n"), nil
		case bufio.ErrBufferFull:
		default:
			return "", err
		}
	}
}

// cutLength finds the last Content-Length header of a line, what stands before
// it, and its value.
func cutLength(line string) (before, value string, found bool) {
	const name = "content-length"
	for at := len(line) - len(name); at >= 0; at-- {
		if !strings.EqualFold(line[at:at+len(name)], name) {
			continue
		}
		rest := strings.TrimLeft(line[at+len(name):], " \t")
		if value, found = strings.CutPrefix(rest, ":"); found {
			return strings.TrimSpace(line[:at]), strings.TrimSpace(value), true
		}
	}
	return "", "", false
}

// isHeaderName reports whether a text can name a header field (RFC 9110,
// section 5.6.2, less the rarer signs).
func isHeaderName(name string) bool {
	name = strings.TrimSpace(name)
	for i := range len(name) {
		c := name[i]
		letter := 'a' <= c|0x20 && c|0x20 <= 'z'
		if !letter && !('0' <= c && c <= '9') && c != '-' && c != '_' {
			return false
		}
	}
	return name != ""
}
