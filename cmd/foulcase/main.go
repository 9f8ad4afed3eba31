// Command foulcase proofreads documents for misspellings, those that are words
// too, and builds and measures the models it does so with. `foulcase --help`
// lists its verbs.
//
// A verb has a file of its own. It declares its flags on a pflag.FlagSet and
// returns the action to take on the operands; run does the rest: parsing,
// help, messages and exit codes.
package main

import "os"

func main() {
	os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr))
}
