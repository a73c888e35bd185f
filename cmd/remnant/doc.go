/*
Remnant takes an action for cosmological perturbations, solves its constraints and returns
the one operator that remains.

Usage:

	remnant reduce FILE [flags]
	remnant expand FILE [flags]
	remnant poles FILE [flags]
	remnant tidy FILE… [-w | --check]
	remnant notation
	remnant code FILE -o DIR
	remnant version

FILE is a model in the notation that 'remnant notation' prints; "-" is standard input.
Results go to standard output, diagnostics to standard error.

# reduce

Reduce prints what remains of the action: what was solved by which equation and under which
assumption, the degrees of freedom with an independent count, the action, its kinetic,
gradient and mass coefficients, the squared sound speed with the conditions for stability,
the equation of motion and the canonical variable. The flags are:

	--format text|latex|json|markdown
		The form of the result. Text is wrapped to the terminal, or to 100 columns in
		a pipe. LaTeX is a document that needs amsmath and amssymb. JSON is documented
		at the type Document of package reduce, and stable.
	--steps
		Show the action after each step of the elimination.
	--full
		Write out expressions that are long and follow from others on the page. JSON
		always holds them.
	--gauge unitary|flat|newtonian|open
	--sector scalar|vector|tensor|all
		Take a covariant or adm model in another gauge or sector than its own, or in
		all sectors, on one page. An open gauge, in which nothing is set to zero, is for
		expand. An adm model takes the unitary gauge only.
	--check gauge
		Verify the Noether identities of the expanded action and print them: before
		the gauge is fixed it does not change under a change of coordinates. The exit
		status is 1 if one fails.
	--series ORDER
		Expand what remains in powers of the wave number on large and on small scales,
		and in the parameters that the model declares small. Without the flag a model
		with small parameters is expanded in these, to the order that it states.
	--at "H = 1/10; phi' = 1/3; k = 2"
	--at @FILE
		Give exact values at a point: assignments split at semicolons, or one on a line
		of a file. A value for what a background relation fixes is checked against it.
		A name that the result does not need is passed over; one that it needs and
		lacks is an error. Values of constants may stand in the model ('numbers'), and
		functions with a definition need none.
	-o FILE
		Write to a file. It is complete or not there.
	--ascii
		Write text in ASCII.
	--width N
		Wrap text to N columns.
	--limit-terms N
		Stop when an expression has more than N terms (200000; 0 is no limit).
	--limit-time D
		Stop after the time D (10m; 0 is no limit).

# expand

Expand prints what a covariant or adm action is at second order, before anything is
eliminated: the gauge and how the metric is perturbed, the background equations as they are
derived, from which perturbation each comes and what it is solved for, and the quadratic
Lagrangian, up to total derivatives. Long factors of its coefficients get names, listed below
it; --full writes them in their places. A quadratic model has nothing to expand; its relations
and its Lagrangian are printed. Expand takes --format, --gauge, --sector, --check, -o, --ascii,
--width, --limit-terms and --limit-time as reduce does. Its JSON is documented at the type
ExpansionDocument of package reduce; the Lagrangian in it can be read back.

# poles

Poles reduces an action with a form factor to W(s) and counts its zeros in the disc |s| < R, s the
eigenvalue of the background d'Alembertian: with proof, or it says that there is none and what
is known, with exit status 3. Each zero is enclosed and judged: healthy, ghost, tachyon, complex
pair, multiple. The form factor needs a definition or a rule for its Taylor coefficients, and the
constants need numbers in the model.

	--radius R
		The radius of the disc (10).
	--truncate N
		Mark the zeros that W cut after sᴺ has and W has not.

It takes --format, -o, --ascii, --width, --limit-terms and --limit-time as reduce does. Its JSON
is documented at the type PolesDocument of package reduce.

# tidy

Tidy prints files in the standard layout of the notation. Comments stay where they are.
With -w the files are replaced; with --check nothing is written but the names of files that
differ from their standard layout.

# notation

Notation prints the grammar in EBNF, with an example for each production.

# code

Code writes a Go package without dependencies: the coefficients of what remains with their
derivatives by the clock, the mode equation, and a test with exact expectations. It takes
--limit-terms and --limit-time too.

# Exit status

	0   done
	1   a check failed: a file is not in its standard layout, or an action is not invariant
	2   the input was refused
	3   a limit was reached, or the run was interrupted; the message names the stage
	70  a fault of the program; please report it together with the model

# Environment

Headings are bold on a terminal, unless NO_COLOR is set or TERM is dumb. Work of more than a
second shows its stage on a terminal, and nothing in a pipe.
*/
package main
