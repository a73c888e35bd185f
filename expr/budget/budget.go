// Package budget bounds the work of a computation and lets it be interrupted.
//
// The algebra below it has no error results: a product of polynomials is always
// defined. What may happen is that it becomes too large, or that the user no longer
// wants it. Both are reported by Check, which panics with a *Stop; the stage that
// started the work turns that panic into an ordinary error with Catch. A nil
// *Budget is unlimited.
package budget

import (
	"context"
	"fmt"
	"sync/atomic"
)

// Reason says why work was stopped.
type Reason uint8

const (
	// Terms: an expression grew past the limit on its number of terms.
	Terms Reason = iota
	// Interrupted: the context was cancelled, by a signal or a time limit.
	Interrupted
)

// Stop is the error of work that was stopped before it was done.
type Stop struct {
	Stage  string // what was being done, in words: "eliminating alpha"
	Reason Reason
	Limit  int   // for Terms: the limit that was passed
	Cause  error // for Interrupted: the cause of the cancelled context
}

func (s *Stop) Error() string {
	stage := s.Stage
	if stage == "" {
		stage = "starting"
	}
	if s.Reason == Terms {
		return fmt.Sprintf("a result has more than %d terms; stopped while %s", s.Limit, stage)
	}
	return fmt.Sprintf("%v; stopped while %s", s.Cause, stage)
}

func (s *Stop) Unwrap() error { return s.Cause }

// Budget holds the limits of one run. It is safe for concurrent use.
type Budget struct {
	ctx      context.Context
	maxTerms int
	stage    atomic.Pointer[string]
}

// New returns a budget that is over when ctx is done or when a single expression has
// more than maxTerms terms (0: no limit).
func New(ctx context.Context, maxTerms int) *Budget {
	return &Budget{ctx: ctx, maxTerms: maxTerms}
}

// Stage names what is being done now, for the message of a Stop.
func (b *Budget) Stage(name string) {
	if b != nil {
		b.stage.Store(&name)
	}
}

// StageName is the name last given to Stage, or "".
func (b *Budget) StageName() string {
	if b == nil {
		return ""
	}
	if s := b.stage.Load(); s != nil {
		return *s
	}
	return ""
}

// Check panics with a *Stop if the run was cancelled or if terms, the size that an
// expression has reached, is over the limit. Loops call it every few thousand steps.
func (b *Budget) Check(terms int) {
	if b == nil {
		return
	}
	if b.maxTerms > 0 && terms > b.maxTerms {
		panic(&Stop{Stage: b.StageName(), Reason: Terms, Limit: b.maxTerms})
	}
	if b.ctx != nil && b.ctx.Err() != nil {
		panic(&Stop{Stage: b.StageName(), Reason: Interrupted, Cause: context.Cause(b.ctx)})
	}
}

// Catch, deferred, turns the panic of a spent budget into *err and lets every other
// panic pass:
//
//	func Reduce(…) (r *Result, err error) {
//		defer budget.Catch(&err)
func Catch(err *error) {
	switch v := recover().(type) {
	case nil:
	case *Stop:
		*err = v
	default:
		panic(v)
	}
}
