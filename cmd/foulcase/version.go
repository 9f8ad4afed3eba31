package main

import (
	"fmt"
	"io"
	"runtime/debug"
	"time"
)

// printVersion tells what program this is: its version, the commit it was built
// from, the version of Go, and the model inside.
func printVersion(w io.Writer) error {
	info, ok := debug.ReadBuildInfo()
	if !ok {
		info = new(debug.BuildInfo)
	}
	e, err := openEngine("")
	if err != nil {
		return err
	}
	defer e.Close()
	_, err = fmt.Fprintf(w, "foulcase %s\nbuilt with %s\nEnglish model %s\n", versionOf(info), info.GoVersion, e.Hash())
	return err
}

// programVersion is the version of foulcase and, where it is known, the
// revision that it was built from.
func programVersion() string {
	info, ok := debug.ReadBuildInfo()
	if !ok {
		return "unknown"
	}
	return versionOf(info)
}

// versionOf words the version that stands in a program: "v1.2.0 4f1e... modified".
func versionOf(info *debug.BuildInfo) string {
	version := info.Main.Version
	if version == "" {
		version = "unknown"
	}
	if revision := buildSetting(info, "vcs.revision"); revision != "" {
		version += " " + revision
	}
	if buildSetting(info, "vcs.modified") == "true" {
		version += " modified"
	}
	return version
}

// commitTime is when the commit was made that the program was built from; ok is
// false where that is not known.
func commitTime(info *debug.BuildInfo) (t time.Time, ok bool) {
	t, err := time.Parse(time.RFC3339, buildSetting(info, "vcs.time"))
	return t, err == nil
}

func buildSetting(info *debug.BuildInfo, key string) string {
	for _, s := range info.Settings {
		if s.Key == key {
			return s.Value
		}
	}
	return ""
}
