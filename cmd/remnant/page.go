package main

// A page: what is said of a result, without saying how it looks. The text, LaTeX and
// Markdown writers print the same page.

import "remnant/expr/show"

// page is a title, rows below it, and sections.
type page struct {
	title    string
	head     []row
	sections []section
}

// section is a heading with blocks.
type section struct {
	heading phrase
	blocks  []block
}

// block is one of: an equation on lines of its own, rows that are aligned, a sentence.
type block struct {
	display  show.Node
	rows     []row
	sentence phrase
}

// row is a label, a value and a note beside it.
type row struct {
	number int // of a numbered row; else 0
	label  phrase
	value  phrase
	note   phrase
}

// phrase is words and mathematics in a line.
type phrase []piece

// piece is words, or mathematics.
type piece struct {
	words string
	maths formula
}

// formula is expressions and the signs between them.
type formula []part

// part is an expression, a sign, or the order of what a series leaves out.
type part struct {
	node  show.Node
	sign  sign
	order show.Node // O(order)
}

// sign stands between expressions.
type sign int

const (
	noSign sign = iota
	equals
	unequal
	greater
	plus
)

var signText = map[sign]string{equals: " = ", unequal: " ≠ ", greater: " > ", plus: " + "}
var signASCII = map[sign]string{equals: " = ", unequal: " != ", greater: " > ", plus: " + "}
var signLaTeX = map[sign]string{equals: " = ", unequal: ` \neq `, greater: " > ", plus: " + "}

func words(s string) phrase { return phrase{{words: s}} }

func maths(nodes ...show.Node) phrase {
	var f formula
	for _, n := range nodes {
		f = append(f, part{node: n})
	}
	return phrase{{maths: f}}
}

// compare is a sign between two expressions; without a left one it begins the formula.
func compare(left show.Node, s sign, right show.Node) phrase {
	var f formula
	if left != nil {
		f = append(f, part{node: left})
	}
	return phrase{{maths: append(f, part{sign: s}, part{node: right})}}
}

// join puts phrases one after another with words between.
func join(between string, list ...phrase) phrase {
	var out phrase
	for i, p := range list {
		if i > 0 && len(p) > 0 && len(out) > 0 {
			out = append(out, piece{words: between})
		}
		out = append(out, p...)
	}
	return out
}

// list joins phrases by commas.
func list(ps []phrase) phrase { return join(", ", ps...) }
