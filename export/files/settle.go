package files

import (
	"errors"
	"io/fs"
	"path/filepath"
	"strings"
)

// restore puts an old set back that was moved aside by a run that was killed before it put the new
// one in its place.
func (s sides) restore(d disk, place string) error {
	if _, err := d.lstat(place); !errors.Is(err, fs.ErrNotExist) {
		return nil
	}
	for _, old := range s.find(d, s.oldPrefix()) {
		if _, err := d.lstat(filepath.Join(old, Manifest)); err == nil {
			return d.rename(old, place)
		}
	}
	return nil
}

// settle clears what runs that were killed have left beside place: the maker's files come home, ours
// are removed. What another living run is working on is left alone, as is anything that cannot be
// moved without overwriting.
func (s sides) settle(d disk, place string, listing Listing) {
	for _, dir := range append(s.find(d, s.newPrefix()), s.find(d, s.oldPrefix())...) {
		unlock, free := d.lock(dir)
		if !free {
			continue
		}
		s.settleOne(d, dir, place, listing)
		unlock()
	}
}

func (s sides) settleOne(d disk, dir, place string, listing Listing) {
	entries, err := d.readDir(dir)
	if err != nil {
		return
	}
	if len(entries) == 0 {
		_ = d.remove(dir)
		return
	}
	left, err := survey(d, dir, listing, func(rel string) bool {
		info, err := d.lstat(filepath.Join(place, filepath.FromSlash(rel)))
		return err == nil && info.IsDir()
	})
	var refused *RefusedError
	if errors.As(err, &refused) {
		// The manifest is written last and removed last: a new directory without one is an
		// unfinished set and nothing else.
		_, none := d.lstat(filepath.Join(dir, Manifest))
		if strings.HasPrefix(filepath.Base(dir), s.newPrefix()) && errors.Is(none, fs.ErrNotExist) {
			_ = d.removeAll(dir)
		}
		return
	}
	if err != nil || carry(d, dir, place, left) != nil {
		return
	}
	discard(d, dir, left)
}
