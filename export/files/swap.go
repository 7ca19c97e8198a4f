package files

import (
	"errors"
	"fmt"
	"io/fs"
	"path"
	"path/filepath"
)

// swap puts the directory stage at place and returns where the old one is now, "" if there was none.
// On an error place is as it was.
func swap(d disk, side sides, stage, place string, exists bool) (aside string, err error) {
	if !exists {
		return "", d.rename(stage, place)
	}
	err = d.exchange(stage, place)
	if err == nil {
		return stage, nil
	}
	if !errors.Is(err, errNoExchange) {
		return "", err
	}
	aside, err = side.free(d, side.oldPrefix())
	if err != nil {
		return "", err
	}
	if err := d.rename(place, aside); err != nil {
		return "", err
	}
	if err := d.rename(stage, place); err != nil {
		if back := d.rename(aside, place); back != nil {
			return "", fmt.Errorf("%w; the old files are in %s and are put back by the next run (%v)", err, aside, back)
		}
		return "", err
	}
	return aside, nil
}

// swapBack undoes swap: the new set is at stage again, the old one at place.
func swapBack(d disk, stage, aside, place string) error {
	if aside == stage {
		return d.exchange(stage, place)
	}
	if err := d.rename(place, stage); err != nil {
		return err
	}
	return d.rename(aside, place)
}

// carry moves what is the maker's from one directory to the other. On an error everything is where
// it was.
func carry(d disk, from, to string, s surveyed) error {
	var undo []func() error
	back := func(err error) error {
		for i := len(undo) - 1; i >= 0; i-- {
			if failed := undo[i](); failed != nil {
				err = fmt.Errorf("%w; going back: %w", err, failed)
			}
		}
		return err
	}
	made := map[string]bool{".": true}
	for _, name := range s.foreign {
		var missing []string
		for p := path.Dir(name); !made[p]; p = path.Dir(p) {
			missing = append(missing, p)
		}
		for i := len(missing) - 1; i >= 0; i-- {
			made[missing[i]] = true
			target := filepath.Join(to, filepath.FromSlash(missing[i]))
			if _, err := d.lstat(target); err == nil {
				continue
			} else if !errors.Is(err, fs.ErrNotExist) {
				return back(err)
			}
			if err := d.mkdir(target, 0o777); err != nil {
				return back(err)
			}
			undo = append(undo, func() error { return d.remove(target) })
		}
		source, target := filepath.Join(from, filepath.FromSlash(name)), filepath.Join(to, filepath.FromSlash(name))
		if _, err := d.lstat(target); err == nil {
			return back(&fs.PathError{Op: "move", Path: source, Err: fs.ErrExist})
		}
		if err := d.rename(source, target); err != nil {
			return back(err)
		}
		undo = append(undo, func() error { return d.rename(target, source) })
	}
	return nil
}

// discard removes our old files and then the directory, never anything else: the manifest, by which
// the directory is known, goes when nothing else is left.
func discard(d disk, dir string, s surveyed) {
	for _, name := range append(append([]string(nil), s.ours...), s.dirs...) {
		if d.remove(filepath.Join(dir, filepath.FromSlash(name))) != nil {
			return
		}
	}
	if entries, err := d.readDir(dir); err != nil || len(entries) > 1 {
		return
	}
	if s.marked && d.remove(filepath.Join(dir, Manifest)) != nil {
		return
	}
	_ = d.remove(dir)
}
