package diag

// Kind names a reason for refusing an input. The comment of each holds the smallest
// example that is refused for it; a test runs the examples.
type Kind string

const (
	// Empty: nothing is in the file.
	//
	// Example:
	//	# only a comment
	Empty Kind = "empty file"

	// TooLarge: the file is longer than any model. A test makes the example.
	TooLarge Kind = "file too large"

	// Binary: the file holds a NUL byte. A test makes the example.
	Binary Kind = "binary file"

	// NotUTF8: the file is no UTF-8 text. A test makes the example.
	NotUTF8 Kind = "not UTF-8"

	// StrayContinuation: an indented line with nothing above it.
	//
	// Example:
	//	  clock cosmic
	StrayContinuation Kind = "nothing to continue"

	// StrayCharacter: a character without meaning.
	//
	// Example:
	//	let x = $
	StrayCharacter Kind = "character without meaning"

	// UnclosedString: a title without its closing mark.
	//
	// Example:
	//	model "Dunlin
	UnclosedString Kind = "title not closed"

	// UnclosedBracket: a bracket that stays open.
	//
	// Example:
	//	let x = (1
	UnclosedBracket Kind = "bracket not closed"

	// UnmatchedBracket: a bracket that closes nothing, or one of the other sort.
	//
	// Example:
	//	let x = 1)
	UnmatchedBracket Kind = "bracket without a partner"

	// TooDeep: nesting beyond the limit. A test makes the example.
	TooDeep Kind = "nested too deeply"

	// NumberTooLarge: a number beyond the limit.
	//
	// Example:
	//	let x = 2e999999999
	NumberTooLarge Kind = "number too large"

	// UnknownStatement: a line that begins with no keyword.
	//
	// Example:
	//	clok cosmic
	UnknownStatement Kind = "unknown statement"

	// StatementForm: a statement whose parts are not in their places.
	//
	// Example:
	//	keep 3
	StatementForm Kind = "malformed statement"

	// EndsEarly: a statement or expression that lacks its end.
	//
	// Example:
	//	let x = 1 +
	EndsEarly Kind = "ends too early"

	// UnknownWord: a word that is none of those to choose from.
	//
	// Example:
	//	clock cosmik
	UnknownWord Kind = "unknown word"

	// UnexpectedToken: something in an expression that cannot stand there.
	//
	// Example:
	//	let x = 1 + * 2
	UnexpectedToken Kind = "unexpected in an expression"

	// MissingMultiplication: two operands side by side.
	//
	// Example:
	//	let x = 2a
	MissingMultiplication Kind = "multiplication not written"

	// PrimeOnNumber: a prime behind a number.
	//
	// Example:
	//	let x = a^2'
	PrimeOnNumber Kind = "prime behind a number"

	// PointForm: an assignment of a point that is not name = value. A test makes the
	// example.
	PointForm Kind = "malformed point"
)
