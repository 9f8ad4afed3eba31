//go:build unix

package wholefile

import (
	"io/fs"
	"os"
	"syscall"
)

// keepOwner gives f the owner and group of a file, or what of it the system lets
// us: only the superuser may give files away.
func keepOwner(f *os.File, info fs.FileInfo) {
	s, ok := info.Sys().(*syscall.Stat_t)
	if !ok {
		return
	}
	if f.Chown(int(s.Uid), int(s.Gid)) != nil {
		_ = f.Chown(-1, int(s.Gid)) // a group of ours, perhaps
	}
}
