package parse

import (
	"slices"
	"strings"
	"unicode/utf8"

	"remnant/parse/diag"
)

// The standard layout: a statement on one line if it fits; a longer sum with one term on
// a line, its mark in front; a longer list filled line by line. Comments stay with the
// piece they follow, names and numbers stay as typed, and of several blank lines one is
// kept. Text that was laid out once is not changed again.

// layoutWidth is the number of characters that a line should not exceed.
const layoutWidth = 88

// Format returns the file in its standard layout. The file must have been parsed without
// a fault.
func Format(f *File) string {
	p := &printer{src: f.Source}
	comments := f.Comments
	lastLine := 0
	for _, s := range f.Statements {
		n := 0
		for n < len(comments) && comments[n].At.Start < s.At.Start {
			n++
		}
		lastLine = p.ownComments(comments[:n], lastLine)
		comments = comments[n:]
		n = 0
		for n < len(comments) && p.belongs(comments[n], s) {
			n++
		}
		p.gap(lastLine, s.At.Start)
		p.statement(s, comments[:n])
		lastLine = f.Source.Line(max(s.At.Start, s.At.End-1))
		comments = comments[n:]
	}
	p.ownComments(comments, lastLine)
	return p.String()
}

// outLine is a line of the layout; trailing comments are aligned in the end.
type outLine struct {
	code, comment string
}

type printer struct {
	src   *diag.Source
	lines []outLine
}

// belongs reports whether a comment stands in a statement or behind it on its last line.
func (p *printer) belongs(c Comment, s *Statement) bool {
	return c.At.Start < s.At.End || !c.Own && p.src.Line(c.At.Start) == p.src.Line(s.At.End-1)
}

// gap keeps one of the blank lines before the line of offset.
func (p *printer) gap(lastLine, offset int) {
	if lastLine > 0 && p.src.Line(offset) > lastLine+1 {
		p.lines = append(p.lines, outLine{})
	}
}

// ownComments prints comments between statements and returns the line of the last.
func (p *printer) ownComments(comments []Comment, lastLine int) int {
	for _, c := range comments {
		p.gap(lastLine, c.At.Start)
		p.lines = append(p.lines, outLine{code: c.Text})
		lastLine = p.src.Line(c.At.Start)
	}
	return lastLine
}

// piece is a part of a statement that a line may begin with.
type piece struct {
	mark     string // "+ " or "- " before it
	text     string
	at       diag.Span
	comments []Comment
}

// statement prints one statement with the comments in it.
func (p *printer) statement(s *Statement, comments []Comment) {
	head, pieces, list := pieces(s)
	before, inside := attach(pieces, comments, s.At.End)
	one := head
	for i, piece := range pieces {
		if list && i > 0 {
			one += ","
		}
		one += " " + piece.mark + piece.text
	}
	switch {
	case !inside && (utf8.RuneCountInString(one) <= layoutWidth || len(pieces) == 0):
		p.lines = append(p.lines, outLine{code: one})
		if len(pieces) > 0 {
			p.after(pieces[len(pieces)-1].comments)
		} else {
			p.after(before)
		}
	case list && !inside:
		p.fill(head, pieces)
	default:
		p.lines = append(p.lines, outLine{code: head})
		p.after(before)
		p.pieceLines(pieces, list)
	}
}

// attach gives every comment to the piece that it follows and returns those before the
// first; inside reports whether one stands before the end of the statement.
func attach(pieces []piece, comments []Comment, end int) (before []Comment, inside bool) {
	for _, c := range comments {
		inside = inside || c.At.Start < end
		i := len(pieces) - 1
		for i >= 0 && pieces[i].at.Start > c.At.Start {
			i--
		}
		if i < 0 {
			before = append(before, c)
			continue
		}
		pieces[i].comments = append(pieces[i].comments, c)
	}
	return before, inside
}

// after prints comments behind the last line: the first on it, the others below.
func (p *printer) after(comments []Comment) {
	if len(comments) > 0 && !comments[0].Own {
		p.lines[len(p.lines)-1].comment = comments[0].Text
		comments = comments[1:]
	}
	for _, c := range comments {
		p.lines = append(p.lines, outLine{code: "    " + c.Text})
	}
}

// pieceLines prints every piece on lines of its own.
func (p *printer) pieceLines(pieces []piece, list bool) {
	for i, piece := range pieces {
		text := piece.text
		if list && i < len(pieces)-1 {
			text += ","
		}
		indent := "    "
		if piece.mark != "" {
			indent = "  " + piece.mark
		}
		for j, part := range wrap(text, layoutWidth-6) {
			if j > 0 {
				indent = "      "
			}
			p.lines = append(p.lines, outLine{code: indent + part})
		}
		p.after(piece.comments)
	}
}

// fill prints a list with as many items on a line as fit.
func (p *printer) fill(head string, pieces []piece) {
	current := head
	for i, piece := range pieces {
		text := piece.text
		if i < len(pieces)-1 {
			text += ","
		}
		if utf8.RuneCountInString(current)+1+utf8.RuneCountInString(text) > layoutWidth {
			p.lines = append(p.lines, outLine{code: current})
			current = "   "
		}
		current += " " + text
	}
	p.lines = append(p.lines, outLine{code: current})
	p.after(pieces[len(pieces)-1].comments)
}

// wrap breaks a long text before marks that stand between blanks.
func wrap(text string, width int) []string {
	var parts []string
	start, size := 0, 0 // of the current part
	word := 0           // where the last breakable stretch begins
	for i := range len(text) {
		if text[i] != ' ' || i+2 >= len(text) || (text[i+1] != '+' && text[i+1] != '-') || text[i+2] != ' ' {
			continue
		}
		n := utf8.RuneCountInString(text[word:i])
		if size > 0 && size+n > width {
			parts = append(parts, text[start:word-1])
			start, size = word, 0
		}
		size += n
		word = i + 1
	}
	if size > 0 && size+utf8.RuneCountInString(text[word:]) > width {
		parts = append(parts, text[start:word-1])
		start = word
	}
	return append(parts, text[start:])
}

// String puts the lines together, comments in neighbouring lines under each other.
func (p *printer) String() string {
	var b strings.Builder
	for i := 0; i < len(p.lines); {
		j, column := i, 0
		for j < len(p.lines) && p.lines[j].comment != "" {
			column = max(column, utf8.RuneCountInString(p.lines[j].code))
			j++
		}
		if j == i {
			b.WriteString(p.lines[i].code + "\n")
			i++
			continue
		}
		for ; i < j; i++ {
			l := p.lines[i]
			b.WriteString(l.code + strings.Repeat(" ", column-utf8.RuneCountInString(l.code)+2) + l.comment + "\n")
		}
	}
	return b.String()
}

// pieces returns the beginning of a statement, the pieces that follow, and whether these
// are a list with commas.
func pieces(s *Statement) (head string, list []piece, isList bool) {
	word := func(w *Word) piece { return piece{text: w.Text, at: w.Span()} }
	head = s.Keyword.Text
	switch {
	case s.Model != nil:
		return head + " " + s.Model.Quoted, nil, false
	case s.Clock != nil:
		return head + " " + s.Clock.Text, nil, false
	case s.Gauge != nil:
		return head + " " + s.Gauge.Text, nil, false
	case s.Sector != nil:
		return head + " " + s.Sector.Text, nil, false
	case s.Constants != nil, s.Background != nil:
		return head, symbolPieces(append(slices.Clone(s.Constants), s.Background...)), true
	case s.Functions != nil:
		return head, functionPieces(s.Functions), true
	case s.FormFactor != nil:
		head, list = formFactorPieces(head, s.FormFactor)
		return head, list, false
	case s.Let != nil:
		return head + " " + s.Let.Word.Text + " =", sumPieces(s.Let.Value.X), false
	case s.Given != nil:
		return head + " " + String(s.Given.Left.X) + " =", sumPieces(s.Given.Right.X), false
	case s.Fields != nil:
		for _, w := range s.Fields {
			list = append(list, word(w))
		}
		return head, list, true
	case s.Lagrangian != nil:
		return head + " " + s.Lagrangian.Form.Text + " =", sumPieces(s.Lagrangian.Value.X), false
	case s.Keep != nil && s.Keep.Definition == nil:
		return head + " " + s.Keep.Word.Text, nil, false
	case s.Keep != nil:
		return head + " " + s.Keep.Word.Text + " =", sumPieces(s.Keep.Definition.X), false
	case s.Small != nil:
		for _, w := range s.Small.Names {
			list = append(list, word(w))
		}
		list[len(list)-1].text += " to order " + s.Small.Order.Text
		return head, list, true
	case s.Numbers != nil:
		for _, e := range s.Numbers {
			list = append(list, piece{text: String(e.Left.X) + " = " + String(e.Right.X), at: e.Span()})
		}
		return head, list, true
	}
	panic("parse: a statement of no kind")
}

func symbolPieces(symbols []*Symbol) []piece {
	list := make([]piece, len(symbols))
	for i, s := range symbols {
		list[i] = piece{text: s.Word.Text, at: s.Word.Span()}
		if s.Sign != "" {
			list[i].text += " " + s.Sign + " 0"
		}
	}
	return list
}

func functionPieces(functions []*Function) []piece {
	list := make([]piece, len(functions))
	for i, f := range functions {
		args := make([]string, len(f.Arguments))
		for j, a := range f.Arguments {
			args[j] = a.Word.Text
			if a.Of != nil {
				args[j] += "(" + a.Of.Text + ")"
			}
		}
		list[i] = piece{text: f.Word.Text + "(" + strings.Join(args, ", ") + ")", at: f.Word.Span()}
		if f.Definition != nil {
			list[i].text += " = " + String(f.Definition.X)
		}
	}
	return list
}

func formFactorPieces(head string, f *FormFactor) (string, []piece) {
	head += " " + f.Word.Text + "(" + f.Argument.Text + ")"
	switch {
	case f.Definition != nil:
		return head + " =", sumPieces(f.Definition.X)
	case f.Rule != nil:
		return head + ": " + f.Rule.Of.Text + "." + f.Rule.Bound.Text + " =", sumPieces(f.Rule.Value.X)
	}
	return head, nil
}

// sumPieces returns the terms of a sum.
func sumPieces(x Expr) []piece {
	sum, ok := x.(*Sum)
	if !ok {
		return []piece{{text: String(x), at: x.Span()}}
	}
	list := make([]piece, len(sum.Terms))
	for i, t := range sum.Terms {
		list[i] = piece{text: String(t.X), at: t.X.Span()}
		switch {
		case t.Minus:
			list[i].mark = "- "
		case i > 0:
			list[i].mark = "+ "
		}
	}
	return list
}

// String returns an expression as one line of text that parses to the same tree.
func String(x Expr) string {
	var b strings.Builder
	write(&b, x)
	return b.String()
}

func write(b *strings.Builder, x Expr) {
	switch n := x.(type) {
	case *Number:
		b.WriteString(n.Text)
	case *Name:
		b.WriteString(n.Text)
	case *Paren:
		b.WriteByte('(')
		write(b, n.X)
		b.WriteByte(')')
	case *Sign:
		b.WriteByte(mark(n.Minus, '-', '+'))
		write(b, n.X)
	case *Sum:
		for i, t := range n.Terms {
			if i > 0 {
				b.WriteString(" " + string(mark(t.Minus, '-', '+')) + " ")
			}
			write(b, t.X)
		}
	case *Product:
		for i, f := range n.Factors {
			if i > 0 {
				b.WriteByte(mark(f.Over, '/', '*'))
			}
			write(b, f.X)
		}
	case *Power:
		write(b, n.Base)
		b.WriteByte('^')
		write(b, n.Exponent)
	case *Factorial:
		write(b, n.X)
		b.WriteByte('!')
	case *Prime:
		write(b, n.X)
		b.WriteString(strings.Repeat("'", n.Count))
	case *Deriv:
		write(b, n.X)
		b.WriteString(n.Mark + n.Label.Text)
	case *Index:
		write(b, n.X)
		b.WriteByte('.')
		write(b, n.Label)
	case *Call:
		write(b, n.Fun)
		for i, a := range n.Args {
			b.WriteString([]string{"(", ", "}[min(i, 1)])
			write(b, a)
		}
		b.WriteByte(')')
	case *Apply:
		write(b, n.Operator)
		b.WriteByte('[')
		write(b, n.X)
		b.WriteByte(']')
	default:
		panic("parse: unknown node in a tree")
	}
}

func mark(yes bool, then, otherwise byte) byte {
	if yes {
		return then
	}
	return otherwise
}
