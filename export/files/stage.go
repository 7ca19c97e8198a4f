package files

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path"
	"path/filepath"
	"sort"
	"strings"
)

// sides are the directories beside the one that is written to: ".NAME.pinwright-new-PID-N" holds a new
// set (after the exchange the old one), ".NAME.pinwright-old-PID-N" the old one moved aside.
type sides struct{ parent, base string }

func (s sides) newPrefix() string { return "." + s.base + ".pinwright-new-" }
func (s sides) oldPrefix() string { return "." + s.base + ".pinwright-old-" }

// free returns a path with the prefix at which nothing is. The number of the process keeps runs
// apart; nothing of it goes into a file.
func (s sides) free(d disk, prefix string) (string, error) {
	for n := 1; n < 1000; n++ {
		p := filepath.Join(s.parent, fmt.Sprintf("%s%d-%d", prefix, os.Getpid(), n))
		_, err := d.lstat(p)
		if errors.Is(err, fs.ErrNotExist) {
			return p, nil
		}
		if err != nil {
			return "", err
		}
	}
	return "", fmt.Errorf("too many %s directories in %s: remove them", prefix, s.parent)
}

// find returns the directories with the prefix, sorted.
func (s sides) find(d disk, prefix string) []string {
	entries, err := d.readDir(s.parent)
	if err != nil {
		return nil
	}
	var found []string
	for _, e := range entries {
		if e.IsDir() && strings.HasPrefix(e.Name(), prefix) {
			found = append(found, filepath.Join(s.parent, e.Name()))
		}
	}
	sort.Strings(found)
	return found
}

// stage writes the set to a new directory beside, the manifest last, and flushes it to the disk. The
// lock on the directory tells other runs that this one lives. On an error nothing is left.
func (s sides) stage(d disk, set []File, old surveyed) (dir string, unlock func(), err error) {
	dir, err = s.free(d, s.newPrefix())
	if err != nil {
		return "", nil, err
	}
	if err := d.mkdir(dir, 0o777); err != nil {
		return "", nil, err
	}
	release, _ := d.lock(dir)
	if err := fill(d, dir, set, old); err != nil {
		release()
		_ = d.removeAll(dir)
		return "", nil, err
	}
	return dir, release, nil
}

// fill writes the set into an empty directory that is to take the place of old.
func fill(d disk, dir string, set []File, old surveyed) error {
	ordered := append([]File(nil), set...)
	sort.SliceStable(ordered, func(i, j int) bool { return ordered[j].Name == Manifest && ordered[i].Name != Manifest })
	dirs := map[string]bool{".": true}
	order := []string{"."}
	for _, f := range ordered {
		if err := makeDirs(d, dir, path.Dir(f.Name), dirs, &order); err != nil {
			return err
		}
		if err := d.writeFile(filepath.Join(dir, filepath.FromSlash(f.Name)+pending(f.Name)), f.Data); err != nil {
			return err
		}
	}
	// A directory with a manifest is a complete one: it appears under its name when all is written.
	manifest := filepath.Join(dir, Manifest)
	if err := d.rename(manifest+pending(Manifest), manifest); err != nil {
		return err
	}
	for i := len(order) - 1; i >= 0; i-- {
		if err := d.syncDir(filepath.Join(dir, filepath.FromSlash(order[i]))); err != nil {
			return err
		}
	}
	if old.exists {
		if err := d.chmod(dir, old.mode); err != nil {
			return err
		}
	}
	return nil
}

// pending is what is added to the name of a file that must not be seen before it is written.
func pending(name string) string {
	if name == Manifest {
		return " (being written)"
	}
	return ""
}

func makeDirs(d disk, root, rel string, made map[string]bool, order *[]string) error {
	if made[rel] {
		return nil
	}
	if err := makeDirs(d, root, path.Dir(rel), made, order); err != nil {
		return err
	}
	if err := d.mkdir(filepath.Join(root, filepath.FromSlash(rel)), 0o777); err != nil {
		return err
	}
	made[rel] = true
	*order = append(*order, rel)
	return nil
}

// asSurveyed is what survey would find where the set was written.
func asSurveyed(set []File) surveyed {
	s := surveyed{exists: true, marked: true}
	seen := map[string]bool{}
	for _, f := range set {
		if f.Name != Manifest {
			s.ours = append(s.ours, f.Name)
		}
		for p := path.Dir(f.Name); p != "." && !seen[p]; p = path.Dir(p) {
			seen[p] = true
			s.dirs = append(s.dirs, p)
		}
	}
	// The longer name first: a directory before the one that it lies in.
	sort.SliceStable(s.dirs, func(i, j int) bool { return len(s.dirs[i]) > len(s.dirs[j]) })
	return s
}
