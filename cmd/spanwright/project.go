package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"unicode/utf8"

	"spanwright/analysis"
	"spanwright/lang/diagnostic"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// largest is the size from which a file is refused: no model is that long, and
// a file of another kind is what such a size means.
const largest = 32 << 20

// read returns the text of a file, or of standard input for "-". What is not
// text is refused in words.
func read(path string, t *terminal) (*source.File, error) {
	var text []byte
	var err error
	name := path
	if path == "-" {
		name = "standard input"
		text, err = io.ReadAll(io.LimitReader(t.in, largest+1))
	} else {
		text, err = readFile(path)
	}
	if err != nil {
		return nil, fmt.Errorf("%s cannot be read: %w", name, plain(err))
	}
	if len(text) > largest {
		return nil, fmt.Errorf("%s is larger than %d MB. Is it a model?", name, largest>>20)
	}
	if !utf8.Valid(text) || strings.ContainsRune(string(text), 0) {
		return nil, fmt.Errorf("%s is not a text in UTF-8. Is it a model?", name)
	}
	return source.New(filepath.ToSlash(path), string(text)), nil
}

// readFile reads a file no further than one byte beyond the largest size.
func readFile(path string) ([]byte, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	if info, err := f.Stat(); err == nil && info.IsDir() {
		return nil, errors.New("it is a folder")
	}
	return io.ReadAll(io.LimitReader(f, largest+1))
}

// plain strips the system's operation and path off an error.
func plain(err error) error {
	var path *fs.PathError
	if errors.As(err, &path) {
		return path.Err
	}
	return err
}

// find returns the files of a command's arguments: files as they are, and of
// folders every .span file below that wanted accepts, sorted.
func find(arguments []string, t *terminal, wanted func(*source.File) bool) ([]string, error) {
	var paths []string
	for _, argument := range arguments {
		info, err := os.Stat(argument)
		if argument == "-" || err == nil && !info.IsDir() {
			paths = append(paths, argument)
			continue
		}
		if err != nil {
			return nil, fmt.Errorf("%s cannot be read: %w", argument, plain(err))
		}
		below, err := findBelow(argument, t, wanted)
		if err != nil {
			return nil, err
		}
		if len(below) == 0 {
			return nil, fmt.Errorf("no models below %s: a model is a .span file with a model line", argument)
		}
		paths = append(paths, below...)
	}
	return paths, nil
}

func findBelow(folder string, t *terminal, wanted func(*source.File) bool) ([]string, error) {
	var paths []string
	err := filepath.WalkDir(folder, func(path string, entry fs.DirEntry, err error) error {
		if err != nil {
			return fmt.Errorf("%s cannot be read: %w", path, plain(err))
		}
		name := entry.Name()
		if entry.IsDir() && path != folder && (strings.HasPrefix(name, ".") || name == "node_modules") {
			return filepath.SkipDir
		}
		if entry.IsDir() || filepath.Ext(name) != ".span" {
			return nil
		}
		file, err := read(path, t)
		if err != nil || wanted(file) {
			paths = append(paths, path) // what cannot be read is told when it is its turn
		}
		return nil
	})
	slices.Sort(paths)
	return paths, err
}

// anyFile accepts every file.
func anyFile(*source.File) bool { return true }

// isModel reports whether a file has a model line.
func isModel(file *source.File) bool {
	for _, u := range syntax.Parse(file).Units {
		if u.Statement.Kind == syntax.ModelKind {
			return true
		}
	}
	return false
}

// disk loads the files that a model uses from disk, each once.
type disk struct {
	trees map[string]*syntax.Tree
	t     *terminal
}

// Load reads the file at a path.
func (d *disk) Load(path string) (*syntax.Tree, error) {
	if tree, ok := d.trees[path]; ok {
		return tree, nil
	}
	if path == "-" {
		return nil, errors.New("standard input cannot be used by another file")
	}
	file, err := read(path, d.t)
	if err != nil {
		return nil, err
	}
	tree := syntax.Parse(file)
	d.trees[path] = tree
	return tree, nil
}

// project is one model with the files that it uses.
type project struct {
	*resolve.Result
	path string
}

// open reads and resolves a model.
func open(path string, t *terminal) (*project, error) {
	file, err := read(path, t)
	if err != nil {
		return nil, err
	}
	loader := &disk{trees: map[string]*syntax.Tree{}, t: t}
	return &project{Result: resolve.Model(syntax.Parse(file), loader), path: path}, nil
}

// solve analyses the model. A model with mistakes that make numbers wrong has
// no results: nil.
func (p *project) solve(ctx context.Context) (*analysis.Results, error) {
	if !p.Complete || p.Library {
		return nil, nil
	}
	return analysis.Run(ctx, p.Model, nil)
}

// diagnostics returns all there is to say: of the text, of the solve, of the
// limits.
func (p *project) diagnostics(ctx context.Context, results *analysis.Results) ([]diagnostic.Diagnostic, error) {
	list := slices.Clone(p.Diagnostics)
	if results != nil {
		list = append(list, results.Diagnostics()...)
		limits, err := results.LimitDiagnostics(ctx)
		if err != nil {
			return nil, err
		}
		list = append(list, limits...)
	}
	diagnostic.Sort(list)
	return list, nil
}

// file returns a file of the model by its path, or nil.
func (p *project) file(path string) *source.File {
	for _, t := range p.Trees {
		if t.File.Path == path {
			return t.File
		}
	}
	return nil
}

// hasErrors reports whether one of the diagnostics is an error.
func hasErrors(list []diagnostic.Diagnostic) bool {
	worst, any := diagnostic.Worst(list)
	return any && worst == diagnostic.Error
}
