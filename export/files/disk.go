package files

import (
	"errors"
	"io/fs"
	"os"
	"runtime"
	"syscall"
)

// disk is what Commit asks of the file system; the tests have one that fails where they want.
type disk interface {
	lstat(name string) (fs.FileInfo, error)
	readDir(name string) ([]fs.DirEntry, error)
	readFile(name string) ([]byte, error)
	mkdir(name string, mode fs.FileMode) error
	chmod(name string, mode fs.FileMode) error
	writeFile(name string, data []byte) error // a new file, flushed to the disk
	syncDir(name string) error
	rename(from, to string) error
	exchange(a, b string) error // errNoExchange where the system cannot
	remove(name string) error   // a file or an empty directory
	removeAll(name string) error
	lock(dir string) (unlock func(), free bool) // free is false if another living run has it
}

var (
	errNoExchange   = errors.New("this system cannot exchange two directories in one step")
	errNotDirectory = error(syscall.ENOTDIR)
)

// isBusy tells whether a directory could not be moved because it is a mount point or in use.
func isBusy(err error) bool {
	return errors.Is(err, syscall.EBUSY) || errors.Is(err, syscall.EXDEV)
}

// osDisk is the real one.
type osDisk struct{}

func (osDisk) lstat(name string) (fs.FileInfo, error)     { return os.Lstat(name) }
func (osDisk) readDir(name string) ([]fs.DirEntry, error) { return os.ReadDir(name) }
func (osDisk) readFile(name string) ([]byte, error)       { return os.ReadFile(name) }
func (osDisk) mkdir(name string, mode fs.FileMode) error  { return os.Mkdir(name, mode) }
func (osDisk) chmod(name string, mode fs.FileMode) error  { return os.Chmod(name, mode) }
func (osDisk) rename(from, to string) error               { return os.Rename(from, to) }
func (osDisk) remove(name string) error                   { return os.Remove(name) }
func (osDisk) removeAll(name string) error                { return os.RemoveAll(name) }
func (osDisk) exchange(a, b string) error                 { return exchange(a, b) }
func (osDisk) lock(dir string) (func(), bool)             { return lock(dir) }

func (osDisk) writeFile(name string, data []byte) error {
	f, err := os.OpenFile(name, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o666)
	if err != nil {
		return err
	}
	_, err = f.Write(data)
	if err == nil {
		err = f.Sync()
	}
	if closed := f.Close(); err == nil {
		err = closed
	}
	return err
}

func (osDisk) syncDir(name string) error {
	if runtime.GOOS == "windows" {
		return nil // a directory cannot be flushed there, and need not be
	}
	f, err := os.Open(name)
	if err != nil {
		return err
	}
	err = f.Sync()
	if errors.Is(err, syscall.EINVAL) || errors.Is(err, syscall.ENOTSUP) {
		err = nil // some file systems have nothing to flush
	}
	if closed := f.Close(); err == nil {
		err = closed
	}
	return err
}
