package proof

import (
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"
	"path"
	"strings"

	"pinwright/export/manifest"
)

// files compares the folder with the list of files and returns the content of the drawings.
func (l *ledger) files(fsys fs.FS, m manifest.Manifest) (map[string][]byte, error) {
	wanted := map[string]bool{}
	for _, s := range tasks(m) {
		wanted[s.file] = true
	}
	contents := map[string][]byte{}
	listed := map[string]bool{manifest.Name: true}
	for _, f := range m.Files {
		listed[f.Name] = true
		l.count(files, 1)
		data, err := fs.ReadFile(fsys, f.Name)
		if errors.Is(err, fs.ErrNotExist) {
			l.fail(files, Finding{File: f.Name, What: "is missing", Do: "write the files anew"})
			continue
		}
		if err != nil {
			l.fail(files, Finding{File: f.Name, What: "cannot be read", Found: err.Error(), Do: "see that it can be opened"})
			continue
		}
		if wanted[f.Name] {
			contents[f.Name] = data
		}
		sum := sha256.Sum256(data)
		switch {
		case int64(len(data)) != f.Size:
			l.fail(files, Finding{
				File: f.Name, What: "was changed after it was written",
				Expected: plural(int(f.Size), "byte"), Found: plural(len(data), "byte"), Do: "write the files anew",
			})
		case hex.EncodeToString(sum[:]) != f.SHA256:
			l.fail(files, Finding{
				File: f.Name, What: "was changed after it was written",
				Expected: "SHA-256 " + f.SHA256[:12] + "...", Found: hex.EncodeToString(sum[:])[:12] + "...",
				Do: "write the files anew",
			})
		}
	}
	err := fs.WalkDir(fsys, ".", func(name string, d fs.DirEntry, err error) error {
		if err != nil {
			return fmt.Errorf("looking through the folder: %w", err)
		}
		if !d.IsDir() && cutFile(name) && !listed[name] {
			l.fail(files, Finding{
				File: name, What: "is not of this run",
				Do: "take it away, lest it be cut as well",
			})
		}
		return nil
	})
	return contents, err
}

// cutFile says whether a laser's program would take the file.
func cutFile(name string) bool {
	switch strings.ToLower(path.Ext(name)) {
	case ".dxf", ".svg", ".pdf":
		return true
	}
	return false
}
