package foulcase_test

import (
	"context"
	"errors"
	"fmt"
	"log"
	"strings"

	"example.org/foulcase"
	"example.org/foulcase/lm/english"
)

// Proofread a document. The package lm/english holds the English model; a model
// of your own is opened with OpenFile.
func Example() {
	engine, err := foulcase.Open(english.Model())
	if err != nil {
		log.Fatal(err)
	}
	document := strings.NewReader("The anchor did not hold untill noon under the shear weight of the hull.")
	for mark, err := range engine.Proof(context.Background(), document, foulcase.Options{}) {
		if err != nil {
			log.Fatal(err)
		}
		fmt.Printf("%d:%d %s %s %q -> %q\n", mark.Line, mark.Column, mark.Grade, mark.Kind, mark.Observed, mark.Corrections[0].Text)
	}
	// Output:
	// 1:25 mark nonword "untill" -> "until"
	// 1:47 query realword "shear" -> "sheer"
}

// Markup is left alone, and so are words that the house's own list has.
func ExampleEngine_Proof() {
	house, err := foulcase.ReadHouse("our words", strings.NewReader("Tollgarth\nkedging\npilot boat, not pilotboat\n"))
	if err != nil {
		log.Fatal(err)
	}
	document := strings.NewReader("# Kedging at Tollgarth\n\nThe *pilotboat* lay at `brth_4` when the rope **par**teed.\n")
	for mark, err := range engine().Proof(context.Background(), document, foulcase.Options{Format: "markdown", House: house, Variety: foulcase.British}) {
		if err != nil {
			log.Fatal(err)
		}
		fmt.Printf("line %d: %s -> %s\n", mark.Line, mark.Observed, mark.Corrections[0].Text)
	}
	// Output:
	// line 3: pilotboat -> pilot boat
	// line 3: par**teed -> parted
}

// What a word may have been meant to be, by itself and between other words.
func ExampleEngine_Rank() {
	for _, context := range []foulcase.RankOptions{
		{K: 2},
		{K: 2, Left: "the leak was in the", Right: "of the ship"},
	} {
		for _, c := range engine().Rank("hul", context).Candidates {
			fmt.Println(c.Text)
		}
	}
	// Output:
	// hull
	// hurl
	// hull
	// hall
}

// A document under its writer's hands: after an edit, only what it touched is
// judged again.
func ExampleEngine_NewDraft() {
	draft, err := engine().NewDraft([]byte("The pilot boarded at noon. All was wel on deck."), foulcase.Options{})
	if err != nil {
		log.Fatal(err)
	}
	defer draft.Close()
	show := func() {
		marks, err := draft.Marks(context.Background(), nil)
		if err != nil {
			log.Fatal(err)
		}
		for _, m := range marks {
			fmt.Println(m.Offset, m.Observed, "->", m.Corrections[0].Text)
		}
		fmt.Println(len(marks), "marks")
	}
	show()
	at := len("The pilot boarded at noon. All was wel")
	if err := draft.Edit(at, at, []byte("l")); err != nil {
		log.Fatal(err)
	}
	show()
	// Output:
	// 35 wel -> well
	// 1 marks
	// 0 marks
}

// Put sure corrections into a document. What stands there by the writer's will is
// the caller's to leave out.
func ExampleRevise() {
	document := []byte("The crew recieved thier orders.\r\n")
	var marks []foulcase.Mark
	for m, err := range engine().Proof(context.Background(), strings.NewReader(string(document)), foulcase.Options{}) {
		if err != nil {
			log.Fatal(err)
		}
		marks = append(marks, m)
	}
	revision, err := foulcase.Revise(document, foulcase.Options{}, marks)
	if err != nil {
		log.Fatal(err)
	}
	corrected, err := revision.Apply(document)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("%q, %d left\n", corrected, len(revision.Left))
	// Output: "The crew received their orders.\r\n", 0 left
}

// Errors of opening can be told apart.
func ExampleOpen() {
	_, err := foulcase.Open([]byte("no model at all"))
	fmt.Println(errors.Is(err, foulcase.ErrForeign))
	// Output: true
}

// Why was it marked? A ledger has the parts of every score in a sentence.
func ExampleEngine_Ledger() {
	ledger := engine().Ledger("It sank under the shear weight of the hull.", foulcase.Options{})
	for _, word := range ledger.Words {
		if word.P > .5 {
			for _, reading := range word.Readings[:3] {
				fmt.Println(reading.Text)
			}
		}
	}
	// Output:
	// shear
	// sheer
	// share
}
