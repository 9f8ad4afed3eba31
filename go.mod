module example.org/foulcase

go 1.26.0

require (
	github.com/agnivade/levenshtein v1.2.2
	github.com/aymanbagabas/go-udiff v0.4.2
	github.com/clipperhouse/uax29/v2 v2.7.0
	github.com/pelletier/go-toml/v2 v2.4.3
	github.com/rogpeppe/go-internal v1.16.0
	github.com/santhosh-tekuri/jsonschema/v6 v6.0.3
	github.com/spf13/pflag v1.1.0
	github.com/yuin/goldmark v1.8.7
	golang.org/x/term v0.48.0
	golang.org/x/text v0.44.0
)

require (
	golang.org/x/sys v0.50.0 // indirect
	golang.org/x/tools v0.52.0 // indirect
)
