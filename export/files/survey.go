package files

import (
	"errors"
	"fmt"
	"io/fs"
	"path"
	"path/filepath"
	"strings"
)

// surveyed is what lies in a directory before a run. Names are relative, with forward slashes.
type surveyed struct {
	exists  bool
	mode    fs.FileMode
	ours    []string // regular files named by the manifest, the manifest itself left out
	marked  bool     // the manifest is there
	dirs    []string // directories that are empty once ours and foreign are gone, the deepest first
	foreign []string // the maker's: files, links, and whole directories that the new set has no use for
}

// survey sorts what lies at place. A directory of the maker's in which nothing of ours lies is taken as
// one thing, unless there is a directory of that name (slash-separated) where it is to go.
// A missing or empty place is nobody's, and so is
// one that only a file manager has written to.
func survey(d disk, place string, listing Listing, shared func(dir string) bool) (surveyed, error) {
	var s surveyed
	info, err := d.lstat(place)
	if errors.Is(err, fs.ErrNotExist) {
		return s, nil
	}
	if err != nil {
		return s, err
	}
	s.exists, s.mode = true, info.Mode().Perm()
	entries, err := d.readDir(place)
	if err != nil || len(entries) == 0 {
		return s, err
	}
	listed, err := readListing(d, place, listing)
	if errors.Is(err, fs.ErrNotExist) && onlyDroppings(entries) {
		for _, e := range entries {
			s.foreign = append(s.foreign, e.Name())
		}
		return s, nil
	}
	if err != nil {
		if errors.Is(err, fs.ErrNotExist) {
			err = fmt.Errorf("there is no %s", Manifest)
		}
		return s, &RefusedError{Why: fmt.Sprintf("holds files that are not from an earlier run (%s: %v), and they are left alone: choose another directory",
			firstNames(entries), err)}
	}
	s.marked = true
	m := sorter{d: d, place: place, ours: map[string]bool{}, made: dirsOf(listed), shared: shared}
	for _, name := range listed {
		m.ours[name] = true
	}
	_, err = m.sort(&s, ".")
	return s, err
}

// dirsOf returns the directories that files of these names lie in, folded.
func dirsOf(names []string) map[string]bool {
	dirs := map[string]bool{}
	for _, name := range names {
		for dir := path.Dir(name); dir != "." && dir != "/" && !dirs[fold(dir)]; dir = path.Dir(dir) {
			dirs[fold(dir)] = true
		}
	}
	return dirs
}

// sorter knows which files the manifest names, the directories that were made for them (folded), and
// which directories of the maker's are to be merged with others.
type sorter struct {
	d      disk
	place  string
	ours   map[string]bool
	made   map[string]bool
	shared func(dir string) bool
}

// sort adds what lies in the directory rel and tells whether any of it is ours.
func (m *sorter) sort(s *surveyed, rel string) (found bool, err error) {
	entries, err := m.d.readDir(filepath.Join(m.place, filepath.FromSlash(rel)))
	if err != nil {
		return false, err
	}
	before := len(s.foreign)
	for _, e := range entries {
		name := path.Join(rel, e.Name())
		switch {
		case name == Manifest:
		case e.IsDir():
			inside, err := m.sort(s, name)
			if err != nil {
				return false, err
			}
			found = found || inside
		case e.Type().IsRegular() && m.ours[name]:
			s.ours = append(s.ours, name)
			found = true
		default:
			s.foreign = append(s.foreign, name)
		}
	}
	if rel == "." {
		return found, nil
	}
	if found || m.made[fold(rel)] || m.shared(rel) {
		s.dirs = append(s.dirs, rel)
		return true, nil
	}
	s.foreign = append(s.foreign[:before], rel)
	return false, nil
}

// refuseClash refuses a set that needs a name of the maker's.
func (s *surveyed) refuseClash(set []File) error {
	wanted := map[string]bool{}
	for _, f := range set {
		for p := f.Name; p != "."; p = path.Dir(p) {
			wanted[fold(p)] = true
		}
	}
	isFile := map[string]bool{}
	for _, f := range set {
		isFile[fold(f.Name)] = true
	}
	for _, name := range s.foreign {
		clash := wanted[fold(name)]
		for p := path.Dir(name); p != "."; p = path.Dir(p) {
			clash = clash || isFile[fold(p)]
		}
		if clash {
			return &RefusedError{Why: fmt.Sprintf("%s in it is not from an earlier run, and the new files need its place: move it away", name)}
		}
	}
	return nil
}

func readListing(d disk, place string, listing Listing) ([]string, error) {
	file := filepath.Join(place, Manifest)
	info, err := d.lstat(file)
	if err != nil {
		return nil, err
	}
	if !info.Mode().IsRegular() {
		return nil, fmt.Errorf("%s is not a plain file", Manifest)
	}
	data, err := d.readFile(file)
	if err != nil {
		return nil, err
	}
	names, err := listing(data)
	if err != nil {
		return nil, fmt.Errorf("%s is %w", Manifest, err)
	}
	return names, nil
}

// onlyDroppings tells whether there is nothing but what file managers leave in a directory that
// somebody has looked into.
func onlyDroppings(entries []fs.DirEntry) bool {
	for _, e := range entries {
		switch e.Name() {
		case ".DS_Store", "Thumbs.db", "desktop.ini", ".directory":
		default:
			return false
		}
	}
	return true
}

func firstNames(entries []fs.DirEntry) string {
	var names []string
	for _, e := range entries[:min(3, len(entries))] {
		names = append(names, e.Name())
	}
	if len(entries) > 3 {
		names = append(names, "...")
	}
	return strings.Join(names, ", ")
}
