// Package files puts the files of a run in place so that all of them appear together or none does.
//
// A run's files belong to a directory that holds a manifest (manifest.json) naming them. A later
// run into the same directory takes the old set away and puts the new one there, in one step;
// whatever else lies in the directory is the maker's and stays. A directory that holds something
// and no manifest of ours is refused.
package files

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
)

// Manifest is the name of the file by which a later run knows that a directory is ours. Every set
// has one.
const Manifest = "manifest.json"

// File is one file of a set. Name is relative to the directory, with forward slashes
// ("clear3-1.dxf", "parts/left-1.crank.dxf").
type File struct {
	Name string
	Data []byte
}

// Listing tells which files a manifest names; an error says that the manifest is not ours. Listed
// is the usual one, and nil stands for it.
type Listing func(manifest []byte) ([]string, error)

// RefusedError says why a directory is not written to. Nothing was changed.
type RefusedError struct {
	Dir string
	Why string // "... : what to do"
}

// Error says which directory and why.
func (e *RefusedError) Error() string { return e.Dir + ": " + e.Why }

// Commit makes set the contents of directory dir, all of it or none of it.
//
// The plan:
//
//  1. The names of the set are checked, dir is resolved (a link to a directory is followed), and
//     what lies there is sorted into ours (regular files that its manifest names, and the manifest)
//     and the maker's (everything else). A file in the place of dir, a directory without a manifest
//     of ours that holds anything, a name of the set that is taken by something of the maker's, and
//     the directory that the program runs in are refused.
//  2. The set is written to a new directory beside dir (".NAME.pinwright-new-..."), the manifest last,
//     and flushed to the disk.
//  3. The two directories change places: by one system call where there is one (Linux, macOS), else by
//     two renames, the first of which is undone if the second fails. If dir does not exist yet, one
//     rename puts the new one there.
//  4. What is the maker's moves over from the old directory. If that fails, everything goes back.
//  5. Our old files are removed, and with them what an earlier run left when it was killed.
//
// An error means that dir is as it was. If the program is killed on the way, dir holds the whole old
// set or the whole new set; where step 3 takes two renames it may be missing for that moment, and
// the next run puts the old one back first. Files of the maker's that a killed run left in the
// directory beside are brought back by the next run too.
func Commit(dir string, set []File, listing Listing) error {
	if listing == nil {
		listing = Listed
	}
	return commit(osDisk{}, dir, set, listing)
}

func commit(d disk, dir string, set []File, listing Listing) (err error) {
	if err := checkNames(set); err != nil {
		return err
	}
	place, err := resolve(d, dir)
	if err != nil {
		return err
	}
	side := sides{parent: filepath.Dir(place), base: filepath.Base(place)}
	undo, err := makeParents(d, side.parent)
	if err != nil {
		return explain(dir, "make the directory above it", err)
	}
	defer func() {
		if err != nil {
			undo()
		}
	}()
	if err := side.restore(d, place); err != nil {
		return explain(dir, "put back what an earlier run had moved aside", err)
	}
	needed := dirsOf(namesOf(set))
	old, err := survey(d, place, listing, func(dir string) bool { return needed[fold(dir)] })
	if err == nil {
		err = old.refuseClash(set)
	}
	if err != nil {
		return refuse(dir, err)
	}
	if old.exists {
		unlock, free := d.lock(place)
		if !free {
			return &RefusedError{Dir: dir, Why: "another run is writing to it: wait for it to end"}
		}
		defer unlock()
	}
	stage, unlock, err := side.stage(d, set, old)
	if err != nil {
		return explain(dir, "write the files beside it", err)
	}
	defer unlock()
	if err := putInPlace(d, side, stage, place, set, old); err != nil {
		return explain(dir, "put the new files in place", err)
	}
	// The set is in place and complete. From here on nothing can fail that matters: what is not
	// removed now is removed by the next run.
	_ = d.syncDir(place)
	_ = d.syncDir(side.parent)
	side.settle(d, place, listing)
	return nil
}

// putInPlace does steps 3 to 5. After an error the old set is at place and the new one is gone.
func putInPlace(d disk, side sides, stage, place string, set []File, old surveyed) error {
	aside, err := swap(d, side, stage, place, old.exists)
	if err != nil {
		discard(d, stage, asSurveyed(set))
		return err
	}
	if aside == "" {
		return nil
	}
	if err := carry(d, aside, place, old); err != nil {
		if back := swapBack(d, stage, aside, place); back != nil {
			return fmt.Errorf("%w; the old files and your own are in %s (going back: %w)", err, aside, back)
		}
		discard(d, stage, asSurveyed(set))
		return err
	}
	discard(d, aside, old)
	return nil
}

// explain says what was being done and, where the system's words are not plain, what it means.
func explain(dir, doing string, err error) error {
	hint := ""
	switch {
	case errors.Is(err, fs.ErrPermission):
		hint = ": no permission; choose another directory, or change the rights of this one and of the one above it"
	case isBusy(err):
		hint = ": the directory is in use or cannot be moved; close programs that have its files open, or choose a directory inside it"
	}
	return fmt.Errorf("%s: cannot %s: %w%s", dir, doing, err, hint)
}

func refuse(dir string, err error) error {
	var refused *RefusedError
	if errors.As(err, &refused) {
		refused.Dir = dir
		return refused
	}
	return explain(dir, "look into it", err)
}

// resolve returns the absolute path of dir, links followed. The directory may be missing.
func resolve(d disk, dir string) (string, error) {
	if dir == "" {
		return "", &RefusedError{Dir: `""`, Why: "no directory is given"}
	}
	place, err := filepath.Abs(dir)
	if err != nil {
		return "", explain(dir, "find it", err)
	}
	info, err := d.lstat(place)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		// The last element is missing; links above it are followed by the system.
	case errors.Is(err, errNotDirectory):
		return "", &RefusedError{Dir: dir, Why: "something on the way to it is a file: choose another directory"}
	case err != nil:
		return "", explain(dir, "look at it", err)
	case info.Mode()&fs.ModeSymlink != 0:
		if place, err = filepath.EvalSymlinks(place); err != nil {
			return "", &RefusedError{Dir: dir, Why: "is a link that leads nowhere: remove it or choose another directory"}
		}
		if info, err = d.lstat(place); err != nil {
			return "", explain(dir, "look at it", err)
		}
	}
	if info != nil && !info.IsDir() {
		return "", &RefusedError{Dir: dir, Why: "is a file, not a directory: choose another name or move it away"}
	}
	if place == filepath.Dir(place) {
		return "", &RefusedError{Dir: dir, Why: "is the root of the file system: choose a directory in it"}
	}
	return place, refuseWorkingDirectory(dir, place)
}

// refuseWorkingDirectory keeps the floor under the maker's shell: a directory that is swapped away
// while one stands in it is gone.
func refuseWorkingDirectory(dir, place string) error {
	here, err := os.Getwd()
	if err != nil {
		return nil // there is none: nothing to lose
	}
	if real, err := filepath.EvalSymlinks(here); err == nil {
		here = real
	}
	if real, err := filepath.EvalSymlinks(place); err == nil {
		place = real
	}
	rel, err := filepath.Rel(place, here)
	if err != nil || rel == ".." || strings.HasPrefix(rel, ".."+string(filepath.Separator)) {
		return nil
	}
	return &RefusedError{Dir: dir, Why: "you are working in this directory, and it is replaced as a whole: run from outside it, or choose a directory in it"}
}

// makeParents makes the directories that are missing down to parent; undo removes those again.
func makeParents(d disk, parent string) (undo func(), err error) {
	var made []string
	undo = func() {
		for i := len(made) - 1; i >= 0; i-- {
			_ = d.remove(made[i])
		}
	}
	var missing []string
	for p := parent; ; p = filepath.Dir(p) {
		_, err := d.lstat(p)
		if err == nil || p == filepath.Dir(p) {
			break
		}
		if !errors.Is(err, fs.ErrNotExist) {
			return undo, err
		}
		missing = append(missing, p)
	}
	for i := len(missing) - 1; i >= 0; i-- {
		if err := d.mkdir(missing[i], 0o777); err != nil {
			undo()
			return func() {}, err
		}
		made = append(made, missing[i])
	}
	return undo, nil
}
