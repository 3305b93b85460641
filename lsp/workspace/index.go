package workspace

import (
	"context"
	"io/fs"
	"maps"
	"path"
	"path/filepath"
	"slices"
	"strings"

	"spanwright/lang/resolve"
	"spanwright/lang/syntax"
)

// known is what the index holds of a file: enough to find the models that a
// shared file belongs to.
type known struct {
	model bool
	uses  []string // paths
}

// scanned bounds the number of files that the index takes in.
const scanned = 5000

// about returns what the index holds of a tree.
func about(tree *syntax.Tree) known {
	var k known
	for i := range tree.Units {
		switch s := tree.Units[i].Statement; s.Kind {
		case syntax.ModelKind:
			k.model = true
		case syntax.UseKind:
			if use, ok := s.Tree.(*syntax.UseStatement); ok && use.Path != nil {
				k.uses = append(k.uses, resolve.ResolvePath(tree.File.Path, use.Path.Value()))
			}
		}
	}
	return k
}

// scan reads the .span files below folders. Hidden folders are left out.
func scan(ctx context.Context, folders []string, d *disk) map[string]known {
	files := map[string]known{}
	for _, folder := range folders {
		// What cannot be read is not in the index; whoever needs it will say so.
		_ = filepath.WalkDir(filepath.FromSlash(folder), func(name string, entry fs.DirEntry, err error) error {
			switch {
			case ctx.Err() != nil || len(files) >= scanned:
				return fs.SkipAll
			case err != nil:
				return nil
			case entry.IsDir():
				if base := entry.Name(); base == "node_modules" || strings.HasPrefix(base, ".") && base != "." && filepath.ToSlash(name) != folder {
					return fs.SkipDir
				}
				return nil
			case filepath.Ext(name) != ".span":
				return nil
			}
			p := filepath.ToSlash(name)
			if tree, err := d.tree(p); err == nil {
				files[p] = about(tree)
			}
			return nil
		})
	}
	return files
}

// users returns the models that use a file, directly or through others, sorted.
func users(files map[string]known, file string) []string {
	by := map[string][]string{}
	for name, k := range files {
		for _, used := range k.uses {
			by[used] = append(by[used], name)
		}
	}
	found, seen := map[string]bool{}, map[string]bool{file: true}
	queue := []string{file}
	for len(queue) > 0 {
		next := queue[0]
		queue = queue[1:]
		for _, user := range by[next] {
			if seen[user] {
				continue
			}
			seen[user] = true
			if files[user].model {
				found[user] = true
			} else {
				queue = append(queue, user)
			}
		}
	}
	return slices.Sorted(maps.Keys(found))
}

// below reports whether a file lies in one of the folders.
func below(folders []string, file string) bool {
	for _, f := range folders {
		if strings.HasPrefix(file, strings.TrimSuffix(path.Clean(f), "/")+"/") {
			return true
		}
	}
	return false
}
