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

	// DeclaredTwice: one name for two things.
	//
	// Example:
	//	constants m, m
	DeclaredTwice Kind = "declared twice"

	// Reserved: a name of the notation that cannot be declared.
	//
	// Example:
	//	constants k
	Reserved Kind = "reserved name"

	// UnknownName: a name that is declared nowhere.
	//
	// Example:
	//	fields u
	//	lagrangian quadratic = v^2
	UnknownName Kind = "unknown name"

	// UsedBefore: a name used above its declaration.
	//
	// Example:
	//	let x = m
	//	constants m
	UsedBefore Kind = "used before its declaration"

	// StatementTwice: a second statement of a kind that may stand once.
	//
	// Example:
	//	clock cosmic
	//	clock efolds
	StatementTwice Kind = "statement given twice"

	// Missing: a part that a model needs.
	//
	// Example:
	//	fields u
	Missing Kind = "something is missing"

	// FieldUnused: a field that stands nowhere in the Lagrangian.
	//
	// Example:
	//	fields u, v
	//	lagrangian quadratic = u'^2
	FieldUnused Kind = "field not used"

	// WrongForm: a statement of another form of the Lagrangian.
	//
	// Example:
	//	fields u
	//	gauge flat
	//	lagrangian quadratic = u'^2
	WrongForm Kind = "statement of another form"

	// NotYetSupported: part of the notation that cannot be computed yet.
	//
	// Example:
	//	background a
	//	lagrangian covariant = R*exp(box)[R]
	NotYetSupported Kind = "not yet supported"

	// IndexOnce: an index that is not summed.
	//
	// Example:
	//	fields u
	//	lagrangian quadratic = u,i*u
	IndexOnce Kind = "index stands once"

	// IndexTooOften: an index that stands more than twice in a product.
	//
	// Example:
	//	fields u
	//	lagrangian quadratic = u,i*u,ii
	IndexTooOften Kind = "index stands too often"

	// IndexMismatch: terms of a sum with different free indices.
	//
	// Example:
	//	fields u
	//	lagrangian quadratic = (u,i + u)*u,i
	IndexMismatch Kind = "indices of a sum differ"

	// NotAnIndex: a derivative by what is neither an index nor an argument.
	//
	// Example:
	//	fields u
	//	lagrangian quadratic = u,x*u,x
	NotAnIndex Kind = "no index and no argument"

	// SpaceOfBackground: a space derivative of a function of time.
	//
	// Example:
	//	background b
	//	fields u
	//	lagrangian quadratic = b,i*u*u,i
	SpaceOfBackground Kind = "space derivative of a function of time"

	// WrongOrder: a term that is not quadratic, or in a new variable not linear.
	//
	// Example:
	//	fields u
	//	lagrangian quadratic = u^3
	WrongOrder Kind = "wrong order in the perturbations"

	// DivideByField: a perturbation in a denominator.
	//
	// Example:
	//	fields u
	//	lagrangian quadratic = u^2/u
	DivideByField Kind = "division by a perturbation"

	// DivideByZero: a denominator that is zero modulo the relations.
	//
	// Example:
	//	background b
	//	given b = 0
	//	fields u
	//	lagrangian quadratic = u^2/b
	DivideByZero Kind = "division by zero"

	// NotBackground: a perturbation where only background quantities may stand.
	//
	// Example:
	//	background b
	//	fields u
	//	given b' = u
	NotBackground Kind = "perturbation in a background expression"

	// BadExponent: an exponent or order that is not of the kind expected.
	//
	// Example:
	//	constants m
	//	let x = 2^m
	BadExponent Kind = "exponent is no rational number"

	// ExponentTooLarge: a power beyond the limit.
	//
	// Example:
	//	constants m
	//	let x = m^1000000000
	ExponentTooLarge Kind = "exponent too large"

	// OrderTooHigh: a derivative beyond the limit. A test makes the example.
	OrderTooHigh Kind = "order too high"

	// OperatorAlone: box without something to act on.
	//
	// Example:
	//	fields u
	//	lagrangian quadratic = u*box
	OperatorAlone Kind = "operator without an operand"

	// NotAnOperator: square brackets behind what holds no box.
	//
	// Example:
	//	constants m
	//	fields u
	//	lagrangian quadratic = m*u[u]
	NotAnOperator Kind = "no operator"

	// WrongArguments: a function with arguments other than its own.
	//
	// Example:
	//	background phi, chi
	//	functions V(phi)
	//	let x = V(chi)
	WrongArguments Kind = "wrong arguments"

	// NotAFunction: arguments behind what is no function.
	//
	// Example:
	//	constants m
	//	let x = m(1 + m)
	NotAFunction Kind = "no function"

	// BadArgument: a function that is not defined or not computed for an argument.
	//
	// Example:
	//	let x = log(0)
	BadArgument Kind = "outside the domain of a function"

	// NoMeaning: a notation of another form of the Lagrangian.
	//
	// Example:
	//	fields u
	//	lagrangian quadratic = u;a*u;a
	NoMeaning Kind = "without meaning here"

	// Contradiction: relations that cannot hold together.
	//
	// Example:
	//	background b
	//	given b = 1
	//	given b' = 2
	Contradiction Kind = "contradictory relations"

	// Unsolvable: a relation that no quantity can be taken from.
	//
	// Example:
	//	background b
	//	given b^2 = 2
	Unsolvable Kind = "relation cannot be solved"

	// GivenTwice: two relations for one quantity.
	//
	// Example:
	//	background b
	//	given b' = 1
	//	given b' = 2
	GivenTwice Kind = "given twice"

	// NotAField: a variable to keep that is no perturbation.
	//
	// Example:
	//	constants m
	//	fields u
	//	lagrangian quadratic = m*u'^2
	//	keep m
	NotAField Kind = "no perturbation"

	// NotASymbol: a value or a smallness for what is no symbol of its own.
	//
	// Example:
	//	constants m
	//	numbers m^2 = 1
	NotASymbol Kind = "no symbol"

	// NotANumber: a value that is no number.
	//
	// Example:
	//	constants m, n
	//	numbers m = n
	NotANumber Kind = "no number"
)
