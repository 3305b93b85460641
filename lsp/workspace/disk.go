package workspace

import (
	"errors"
	"io"
	"os"
	"strings"
	"sync"
	"time"
	"unicode/utf8"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// largest is the size from which a file on disk is not read: it is no model.
const largest = 32 << 20

// disk reads files and keeps them as long as they have not changed.
type disk struct {
	mutex sync.Mutex
	held  map[string]kept
}

type kept struct {
	tree *syntax.Tree
	time time.Time
	size int64
}

// tree returns the file at a path, read. The same tree comes back as long as
// the file keeps its time and size.
func (d *disk) tree(path string) (*syntax.Tree, error) {
	info, err := os.Stat(path)
	if err != nil {
		return nil, err
	}
	d.mutex.Lock()
	k, ok := d.held[path]
	d.mutex.Unlock()
	if ok && k.time.Equal(info.ModTime()) && k.size == info.Size() {
		return k.tree, nil
	}
	text, err := readText(path, info)
	if err != nil {
		return nil, err
	}
	k = kept{syntax.Parse(source.New(path, text)), info.ModTime(), info.Size()}
	d.mutex.Lock()
	defer d.mutex.Unlock()
	if d.held == nil || len(d.held) >= 4096 {
		d.held = map[string]kept{}
	}
	d.held[path] = k
	return k.tree, nil
}

// forget drops a file, so that it is read anew even where time and size agree.
func (d *disk) forget(path string) {
	d.mutex.Lock()
	defer d.mutex.Unlock()
	delete(d.held, path)
}

func readText(path string, info os.FileInfo) (string, error) {
	switch {
	case info.IsDir():
		return "", errors.New("it is a folder")
	case !info.Mode().IsRegular():
		return "", errors.New("it is not a plain file")
	case info.Size() > largest:
		return "", errors.New("it is too large for a model")
	}
	f, err := os.Open(path)
	if err != nil {
		return "", err
	}
	defer f.Close()
	var text strings.Builder
	if _, err := io.Copy(&text, io.LimitReader(f, largest)); err != nil {
		return "", err
	}
	if !utf8.ValidString(text.String()) {
		return "", errors.New("it is not a text in UTF-8")
	}
	return text.String(), nil
}
