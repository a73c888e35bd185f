package parse

import (
	"io"
	"strings"
	"unicode/utf8"

	"github.com/alecthomas/participle/v2/lexer"

	"remnant/parse/diag"
)

// The lexer cuts a text into logical lines and these into tokens. A line that begins
// with blanks continues the one above; comments are set aside; a token keeps the text
// as typed and its byte offset. What cannot be read is reported and left out, so that
// every line is tried.

// The classes of tokens.
const (
	tokenName lexer.TokenType = lexer.EOF - 1 - iota
	tokenNumber
	tokenString
	tokenMark
)

// Limits on the input. They are far beyond any use, and keep hostile input cheap.
const (
	maxDepth    = 1000    // open brackets, and signs, exponents or suffixes in a row
	maxText     = 8 << 20 // bytes in a file
	maxNumber   = 1000    // characters of a number
	maxExponent = 1000    // decimal exponent of a number, and exponent of a power
	maxFaults   = 100     // reported for one input
)

// grammarLexer is what the statement grammar knows of the lexer: the names of the
// token classes, and how a single statement is cut.
type grammarLexer struct{}

func (grammarLexer) Symbols() map[string]lexer.TokenType {
	return map[string]lexer.TokenType{
		"EOF": lexer.EOF, "Name": tokenName, "Number": tokenNumber,
		"String": tokenString, "Mark": tokenMark,
	}
}

func (grammarLexer) Lex(name string, r io.Reader) (lexer.Lexer, error) {
	text, err := io.ReadAll(r)
	if err != nil {
		return nil, err
	}
	s := &scanner{src: diag.NewSource(name, string(text))}
	s.scan()
	if err := s.faults.Err(); err != nil {
		return nil, err
	}
	if len(s.lines) == 0 {
		s.lines = []line{{}}
	}
	return s.lines[0].lexer(), nil
}

// line is one logical line.
type line struct {
	start  int // offset of its first character
	tokens []lexer.Token
	end    lexer.Position // just after the last token
	broken bool           // a part of it could not be read
}

func (l *line) span() diag.Span {
	return diag.Span{Start: l.tokens[0].Pos.Offset, End: l.end.Offset}
}

// first is the first word of the line, empty if it has none.
func (l *line) first() string {
	if len(l.tokens) == 0 {
		return ""
	}
	return l.tokens[0].Value
}

// lexer returns the tokens of the line as a participle lexer.
func (l *line) lexer() lexer.Lexer { return &lineLexer{line: l} }

type lineLexer struct {
	line *line
	next int
}

func (l *lineLexer) Next() (lexer.Token, error) {
	if l.next == len(l.line.tokens) {
		return lexer.EOFToken(l.line.end), nil
	}
	l.next++
	return l.line.tokens[l.next-1], nil
}

// Comment is a comment with its place.
type Comment struct {
	At   diag.Span
	Text string // from '#', without trailing blanks
	Own  bool   // it stands on a line of its own
}

// scanner cuts one source into logical lines and comments.
type scanner struct {
	src      *diag.Source
	flat     bool // every line is a logical line, indented or not
	lines    []line
	comments []Comment
	faults   diag.List
	open     []bracket // brackets of the current logical line
	tooDeep  bool      // reported for the current logical line
}

type bracket struct {
	mark string
	at   diag.Span
}

// scan reads the whole source.
func (s *scanner) scan() {
	if !s.readable() {
		return
	}
	for n := 1; n <= s.src.Lines(); n++ {
		s.physicalLine(s.src.LineStart(n), s.src.LineText(n))
	}
	s.closeLine()
}

func (s *scanner) fault(kind diag.Kind, at diag.Span, summary, hint string) {
	s.faults = append(s.faults, diag.Diagnostic{Kind: kind, Source: s.src, Span: at, Summary: summary, Hint: hint})
	if len(s.lines) > 0 {
		s.lines[len(s.lines)-1].broken = true
	}
}

// readable refuses what is no text.
func (s *scanner) readable() bool {
	text := s.src.Text
	if len(text) > maxText {
		s.fault(diag.TooLarge, diag.Span{}, "the text is longer than 8 MiB", "a model is a few lines of plain text")
		return false
	}
	if i := strings.IndexByte(text, 0); i >= 0 {
		s.fault(diag.Binary, diag.Span{Start: i, End: i + 1}, "the file holds binary data", "plain UTF-8 text is read")
		return false
	}
	if !utf8.ValidString(text) {
		i := 0
		for i < len(text) {
			r, n := utf8.DecodeRuneInString(text[i:])
			if r == utf8.RuneError && n == 1 {
				break
			}
			i += n
		}
		s.fault(diag.NotUTF8, diag.Span{Start: i, End: i + 1}, "the text is not valid UTF-8", "save the file as UTF-8")
		return false
	}
	return true
}

// physicalLine scans one line of the file.
func (s *scanner) physicalLine(start int, text string) {
	i := 0
	if start == 0 {
		i = len(text) - len(strings.TrimPrefix(text, "\ufeff")) // a byte order mark is no text
	}
	indented := false
	for i < len(text) && isBlank(text[i]) {
		i, indented = i+1, true
	}
	if i == len(text) {
		return
	}
	if text[i] == '#' {
		s.comment(start+i, text[i:], true)
		return
	}
	switch {
	case !indented || s.flat:
		s.closeLine()
		s.lines = append(s.lines, line{start: start + i})
	case len(s.lines) == 0:
		s.lines = append(s.lines, line{start: start + i})
		s.fault(diag.StrayContinuation, diag.Span{Start: start + i, End: start + i + 1},
			"a line that begins with blanks continues the one above, and there is none", "begin the first statement in column 1")
	}
	for i < len(text) {
		switch {
		case isBlank(text[i]):
			i++
		case text[i] == '#':
			s.comment(start+i, text[i:], false)
			return
		default:
			i += s.token(start+i, text[i:])
		}
	}
}

func isBlank(c byte) bool { return c == ' ' || c == '\t' || c == '\r' || c == '\v' || c == '\f' }

func (s *scanner) comment(start int, text string, own bool) {
	text = strings.TrimRight(text, " \t\r\v\f")
	s.comments = append(s.comments, Comment{At: diag.Span{Start: start, End: start + len(text)}, Text: text, Own: own})
}

// closeLine ends the current logical line and reports brackets that stayed open.
func (s *scanner) closeLine() {
	if len(s.open) > 0 {
		b := s.open[len(s.open)-1]
		s.fault(diag.UnclosedBracket, b.at, "the bracket '"+b.mark+"' is not closed",
			"'"+closing[b.mark]+"' is missing; a line that goes on must begin with blanks")
	}
	s.open, s.tooDeep = nil, false
}

// token scans the token at the start of text and returns its length.
func (s *scanner) token(start int, text string) int {
	r, size := utf8.DecodeRuneInString(text)
	kind, n := tokenMark, size
	switch {
	case r == boxSymbol:
		kind = tokenName
	case isNameStart(r):
		kind, n = tokenName, scanName(text)
	case '0' <= r && r <= '9':
		kind, n = tokenNumber, s.number(start, text)
	case r == '"':
		return s.str(start, text)
	case vulgar[r] != [2]int64{}:
		kind = tokenNumber
	case marks[r] != "" || strings.ContainsRune("+-*/^=(),;.'!<>:√", r):
		s.bracket(start, text[:size])
	case r == '[' || r == ']':
		s.bracket(start, text[:size])
	default:
		s.stray(r, diag.Span{Start: start, End: start + size})
		return size
	}
	s.emit(kind, start, text[:n])
	return n
}

func (s *scanner) emit(kind lexer.TokenType, start int, text string) {
	l := &s.lines[len(s.lines)-1]
	if l.broken {
		return // it will not be parsed
	}
	number := s.src.Line(start)
	pos := lexer.Position{Filename: s.src.Name, Offset: start, Line: number, Column: 1 + start - s.src.LineStart(number)}
	l.tokens = append(l.tokens, lexer.Token{Type: kind, Value: text, Pos: pos})
	pos.Offset += len(text)
	pos.Column += len(text)
	l.end = pos
}

func scanName(text string) int {
	for i, r := range text {
		if !isNamePart(r) {
			return i
		}
	}
	return len(text)
}

// number returns the length of the number at the start of text: digits, then a decimal
// part, then an exponent. After a dot that is no decimal point (F.2) it is digits alone.
func (s *scanner) number(start int, text string) int {
	n := digits(text, 0)
	if !s.afterDot(start) {
		if n < len(text) && text[n] == '.' && digits(text, n+1) > n+1 {
			n = digits(text, n+1)
		}
		n = exponent(text, n)
	}
	if n > maxNumber {
		s.fault(diag.NumberTooLarge, diag.Span{Start: start, End: start + n}, "the number is too long", "at most 1000 characters are read")
	}
	return n
}

func digits(text string, i int) int {
	for i < len(text) && '0' <= text[i] && text[i] <= '9' {
		i++
	}
	return i
}

// exponent returns the end of the number with its decimal exponent, if it has one.
func exponent(text string, n int) int {
	i := n
	if i == len(text) || text[i] != 'e' && text[i] != 'E' {
		return n
	}
	i++
	if i < len(text) && (text[i] == '+' || text[i] == '-') {
		i++
	}
	if end := digits(text, i); end > i {
		return end
	}
	return n
}

func (s *scanner) afterDot(start int) bool {
	tokens := s.lines[len(s.lines)-1].tokens
	if len(tokens) == 0 {
		return false
	}
	last := tokens[len(tokens)-1]
	return last.Value == "." && last.Pos.Offset+1 == start
}

func (s *scanner) str(start int, text string) int {
	end := strings.IndexByte(text[1:], '"')
	if end < 0 {
		s.fault(diag.UnclosedString, diag.Span{Start: start, End: start + 1}, "the title is not closed", "a closing '\"' is missing on this line")
		return len(text)
	}
	s.emit(tokenString, start, text[:end+2])
	return end + 2
}

var closing = map[string]string{"(": ")", "[": "]"}

// bracket counts what opens and closes.
func (s *scanner) bracket(start int, mark string) {
	at := diag.Span{Start: start, End: start + len(mark)}
	switch mark {
	case "(", "[":
		s.open = append(s.open, bracket{mark, at})
		if len(s.open) > maxDepth && !s.tooDeep {
			s.tooDeep = true
			s.fault(diag.TooDeep, at, "brackets are nested too deeply", "at most 1000 may be open at once")
		}
	case ")", "]":
		if len(s.open) == 0 {
			s.fault(diag.UnmatchedBracket, at, "'"+mark+"' closes nothing", "no bracket is open here")
			return
		}
		b := s.open[len(s.open)-1]
		s.open = s.open[:len(s.open)-1]
		if closing[b.mark] != mark {
			s.fault(diag.UnmatchedBracket, at, "'"+mark+"' closes a '"+b.mark+"'", "'"+closing[b.mark]+"' is expected here")
			s.faults[len(s.faults)-1].Related = []diag.Related{{Span: b.at, Label: "opened here"}}
		}
	}
}

// stray reports a character that has no meaning, with what the user may have meant.
func (s *scanner) stray(r rune, at diag.Span) {
	hint := "names, numbers and + - * / ^ ( ) [ ] ' , ; . are read here"
	switch {
	case strings.ContainsRune("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", r):
		hint = "a power is written with ^, as in a^2"
	case r == '∂' || r == '∇':
		hint = "derivatives are written behind: zeta' in time, zeta,i in space, phi;a covariant"
	case r == '{' || r == '}':
		hint = "brackets are ( ) and, for what an operator acts on, [ ]"
	case r == '&' || r == '|' || r == '\\' || r == '$':
		hint = "formulas are plain: a^3*zeta'^2/2"
	case r == '_':
		hint = "a name begins with a letter"
	}
	s.fault(diag.StrayCharacter, at, "the character "+quoteRune(r)+" has no meaning here", hint)
}

func quoteRune(r rune) string {
	if r < ' ' || r == 0x7f || r == utf8.RuneError || 0x80 <= r && r < 0xa0 {
		const hex = "0123456789abcdef"
		return "U+00" + string(hex[r>>4&15]) + string(hex[r&15])
	}
	return "'" + string(r) + "'"
}
