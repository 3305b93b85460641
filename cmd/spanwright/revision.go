package main

import (
	"bytes"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"os/exec"
	"path"
	"path/filepath"
	"strings"

	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// openRevision opens a model for a comparison: a file, REVISION:PATH of the git
// repository around, or the null device, which stands for no model. With as,
// used files are looked for where that path stands.
func openRevision(argument, as string, t *terminal) (*project, error) {
	if argument == os.DevNull {
		return emptyProject(), nil
	}
	if _, err := os.Stat(argument); err != nil && argument != "-" {
		if revision, file, ok := strings.Cut(argument, ":"); ok && revision != "" && file != "" {
			return openInGit(revision, file)
		}
	}
	if as == "" {
		return open(argument, t)
	}
	file, err := read(argument, t)
	if err != nil {
		return nil, err
	}
	loader := &disk{trees: map[string]*syntax.Tree{}, t: t}
	moved := source.New(filepath.ToSlash(as), file.Text)
	return &project{Result: resolve.Model(syntax.Parse(moved), loader), path: as}, nil
}

// emptyProject is a model with nothing in it: what a new file is compared with.
func emptyProject() *project {
	file := source.New(os.DevNull, "model \"\" plane\n")
	return &project{Result: resolve.Model(syntax.Parse(file), nil), path: os.DevNull}
}

// revisionFiles loads files as they are in a revision.
type revisionFiles struct {
	revision string
	trees    map[string]*syntax.Tree
}

func openInGit(revision, file string) (*project, error) {
	files := &revisionFiles{revision, map[string]*syntax.Tree{}}
	tree, err := files.Load(path.Clean(filepath.ToSlash(file)))
	if err != nil {
		return nil, fmt.Errorf("%s:%s cannot be read: %w", revision, file, err)
	}
	return &project{Result: resolve.Model(tree, files), path: tree.File.Path}, nil
}

// missingError says that a revision has no such file.
type missingError struct{ words string }

// Error returns git's words.
func (e *missingError) Error() string { return "git says: " + e.words }

// Unwrap makes it known as a file that does not exist.
func (e *missingError) Unwrap() error { return fs.ErrNotExist }

// Load returns a file of the revision; relative paths start at this folder.
func (r *revisionFiles) Load(name string) (*syntax.Tree, error) {
	if tree, ok := r.trees[name]; ok {
		return tree, nil
	}
	shown := name
	if !path.IsAbs(name) {
		shown = "./" + name // from this folder, not from the top of the repository
	}
	var complaint bytes.Buffer
	git := exec.Command("git", "show", r.revision+":"+shown)
	git.Stderr = &complaint
	text, err := git.Output()
	var exit *exec.ExitError
	switch {
	case errors.As(err, &exit):
		words := strings.TrimSpace(strings.TrimPrefix(complaint.String(), "fatal: "))
		if strings.Contains(words, "exist") {
			return nil, &missingError{words}
		}
		return nil, errors.New("git says: " + words)
	case err != nil:
		return nil, fmt.Errorf("git cannot be run: %w", err)
	}
	tree := syntax.Parse(source.New(name, string(text)))
	r.trees[name] = tree
	return tree, nil
}
