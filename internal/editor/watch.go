package editor

import (
	"encoding/json"
	"fmt"
	"path/filepath"
	"slices"

	"example.org/foulcase/internal/house"
)

// begun registers for what the client must be asked to tell.
func (s *Server) begun(json.RawMessage) *failure {
	if s.client.Workspace.DidChangeConfiguration.DynamicRegistration {
		s.register("workspace/didChangeConfiguration", "foulcase.settings", map[string]string{"section": source})
	}
	if s.watches() {
		s.register("workspace/didChangeWatchedFiles", "foulcase.files", watchOptions{[]watcher{{"**/" + house.FileName}}})
	}
	return nil
}

func (s *Server) watches() bool {
	return s.config.Settings != nil && s.client.Workspace.DidChangeWatchedFiles.DynamicRegistration
}

func (s *Server) register(method, id string, options any) {
	s.ask("client/registerCapability", registrationParams{[]registration{{id, method, options}}}, nil)
}

// maxWatched is the most files that are watched for changes.
const maxWatched = 1000

// watch has the client tell when files change, those it does not watch yet.
func (s *Server) watch(files []string) {
	var options watchOptions
	s.mu.Lock()
	for _, name := range files {
		if name = filepath.Clean(name); !s.watched[name] && len(s.watched) < maxWatched {
			s.watched[name] = true
			options.Watchers = append(options.Watchers, s.watcher(name))
		}
	}
	s.mu.Unlock()
	if s.watches() && len(options.Watchers) > 0 {
		s.register("workspace/didChangeWatchedFiles", fmt.Sprintf("foulcase.files/%d", s.counter.Add(1)), options)
	}
}

func (s *Server) watcher(name string) watcher {
	if s.client.Workspace.DidChangeWatchedFiles.RelativePatternSupport {
		return watcher{relativePattern{uriOf(filepath.Dir(name)), filepath.Base(name)}}
	}
	return watcher{filepath.ToSlash(name)}
}

func (s *Server) isWatched(name string) bool {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.watched[filepath.Clean(name)] || filepath.Base(name) == house.FileName // made just now, maybe
}

// didChangeWatchedFiles: settings are read anew, whichever file it was.
func (s *Server) didChangeWatchedFiles(json.RawMessage) *failure {
	s.forget()
	s.reload(true)
	return nil
}

// forget has the files of settings read anew.
func (s *Server) forget() {
	if s.config.Forget != nil {
		s.config.Forget()
	}
}

// reload has every document's settings looked up again and its marks found, where it
// has some and, if all is wanted, everywhere.
func (s *Server) reload(all bool) {
	s.mu.Lock()
	clear(s.faults)
	s.mu.Unlock()
	s.each(func(d *document) {
		d.inbox.put(task{changes: true, run: func() {
			d.load()
			d.restart(all)
		}})
	})
	s.refresh()
}

// didChangeConfiguration takes the settings that come with it, and asks for those of
// each document where the client can tell.
func (s *Server) didChangeConfiguration(params json.RawMessage) *failure {
	var p didChangeConfigurationParams
	if f := decode(params, &p); f != nil {
		return f
	}
	var all map[string]json.RawMessage
	if json.Unmarshal(p.Settings, &all) == nil {
		s.mu.Lock()
		s.defaults.set(all[source], s.reportSetting)
		s.mu.Unlock()
	}
	s.each(func(d *document) {
		if !s.configure(d) {
			s.prefer(d, nil)
		}
	})
	return nil
}

// configure asks the client for the settings of a document; it reports whether the
// client can tell. The caller holds s.mu.
func (s *Server) configure(d *document) bool {
	if !s.client.Workspace.Configuration {
		return false
	}
	items := []configurationItem{{ScopeURI: d.uri, Section: source}}
	s.ask("workspace/configuration", configurationParams{items}, func(result json.RawMessage, err error) {
		var answers []json.RawMessage
		if err != nil || json.Unmarshal(result, &answers) != nil || len(answers) != 1 {
			s.log(loudWarning, "the client did not tell the settings of %s", d.uri)
			return
		}
		s.mu.Lock()
		defer s.mu.Unlock()
		s.prefer(d, answers[0])
	})
	return true
}

// prefer gives a document the client's settings: the defaults and what is said of it.
// The caller holds s.mu.
func (s *Server) prefer(d *document, raw json.RawMessage) {
	wanted := s.defaults.clone()
	wanted.set(raw, s.reportSetting)
	if wanted.equal(d.preferred) {
		return
	}
	d.preferred = wanted
	d.inbox.put(task{changes: true, run: func() {
		d.asked = wanted
		d.restart(true)
		s.refresh()
	}})
}

// didChangeWorkspaceFolders: documents that are no files and are opened from now on may
// belong elsewhere.
func (s *Server) didChangeWorkspaceFolders(params json.RawMessage) *failure {
	var p didChangeWorkspaceFoldersParams
	if f := decode(params, &p); f != nil {
		return f
	}
	s.mu.Lock()
	s.folders = slices.DeleteFunc(s.folders, func(f workspaceFolder) bool { return slices.Contains(p.Event.Removed, f) })
	s.folders = append(s.folders, p.Event.Added...)
	s.mu.Unlock()
	return nil
}
