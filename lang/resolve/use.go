package resolve

import (
	"errors"
	"io/fs"
	"path"
	"strings"

	"spanwright/lang/diagnostic"
	"spanwright/lang/syntax"
)

// useProblem is why a file cannot be used.
type useProblem struct {
	name    diagnostic.Name
	summary string
}

// readFiles brings the sheets in line with the files: the model's own and all
// that it uses, directly or not. A file that is used comes before its users, so
// that of two equal names the library's counts.
func (s *Session) readFiles(tree *syntax.Tree, loader Loader) {
	s.order = s.order[:0]
	s.main = s.sheet(tree.File.Path)
	s.visitFile(s.main, tree, loader, nil)
	for name, sh := range s.sheets {
		if sh.seen != s.revision {
			for _, f := range sh.fragments {
				s.remove(f)
			}
			delete(s.sheets, name)
		}
	}
	s.readHeader()
}

func (s *Session) sheet(name string) *sheet {
	sh := s.sheets[name]
	if sh == nil {
		sh = &sheet{path: name}
		s.sheets[name] = sh
	}
	return sh
}

// visitFile takes a file in, those that it uses first. Around are the files
// whose "use" led here.
func (s *Session) visitFile(sh *sheet, tree *syntax.Tree, loader Loader, around []string) {
	sh.seen = s.revision
	problems := map[int]*useProblem{}
	around = append(around, sh.path)
	for i := range tree.Units {
		u := &tree.Units[i]
		if u.Statement.Kind != syntax.UseKind || u.Statement.Broken() || u.Block != syntax.TopLevel {
			continue
		}
		if use, ok := u.Statement.Tree.(*syntax.UseStatement); ok && use.Path != nil {
			problems[i] = s.visitUse(sh, use.Path.Value(), loader, around)
		}
	}
	s.arrange(sh, tree)
	for _, f := range sh.fragments {
		if f.statement.Kind != syntax.UseKind {
			continue
		}
		now := problems[f.unit]
		if (f.use == nil) != (now == nil) || now != nil && *f.use != *now {
			f.must = true
			s.mark(f)
		}
		f.use = now
	}
	s.order = append(s.order, sh)
}

// ResolvePath returns the path of a file that another one uses: relative paths
// start at the using file's folder.
func ResolvePath(from, written string) string {
	written = strings.ReplaceAll(written, `\`, "/")
	if path.IsAbs(written) {
		return path.Clean(written)
	}
	return path.Join(path.Dir(from), written)
}

// visitUse takes a used file in and returns what is wrong with using it.
func (s *Session) visitUse(sh *sheet, written string, loader Loader, around []string) *useProblem {
	if strings.TrimSpace(written) == "" {
		return &useProblem{"missing-file", "Write the path of the file to use between the quotes."}
	}
	name := ResolvePath(sh.path, written)
	for i, outer := range around {
		if outer != name {
			continue
		}
		if i == len(around)-1 {
			return &useProblem{"use-cycle", "Delete this line: the file uses itself."}
		}
		return &useProblem{"use-cycle", "Delete this line: " + written + " uses this file in turn, directly or through others."}
	}
	if used := s.sheets[name]; used != nil && used.seen == s.revision {
		return nil
	}
	if loader == nil {
		return &useProblem{"missing-file", "Put " + written + " where it can be read: no other file can be reached from here."}
	}
	tree, err := loader.Load(name)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return &useProblem{"missing-file", "Correct the path: there is no file " + written + " seen from the folder of this one."}
	case err != nil:
		return &useProblem{"missing-file", "Make " + written + " readable: " + err.Error() + "."}
	case tree == nil:
		return &useProblem{"missing-file", "Correct the path: " + written + " cannot be read."}
	}
	for i := range tree.Units {
		if tree.Units[i].Statement.Kind == syntax.ModelKind {
			return &useProblem{"use-of-model", "Use a file without a model line: " + written + " is a model of its own. Move what both share into a third file."}
		}
	}
	s.visitFile(s.sheet(name), tree, loader, around)
	return nil
}

// use reports why a file cannot be used.
func (e *evaluation) use(tree *syntax.UseStatement) {
	if p := e.fragment.use; p != nil {
		e.fail(p.name, tree.Path.Span(), "%s", p.summary)
	}
}
