//go:build linux || darwin || freebsd || netbsd || openbsd || dragonfly

package files

import (
	"errors"
	"os"
	"syscall"
)

// lock marks a directory as being worked on for as long as this process lives. Where the file system
// knows no locks every directory is free.
func lock(dir string) (unlock func(), free bool) {
	f, err := os.Open(dir)
	if err != nil {
		return func() {}, true
	}
	if err := syscall.Flock(int(f.Fd()), syscall.LOCK_EX|syscall.LOCK_NB); errors.Is(err, syscall.EWOULDBLOCK) {
		f.Close()
		return func() {}, false
	}
	return func() { f.Close() }, true
}
