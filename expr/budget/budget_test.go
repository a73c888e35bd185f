package budget

import (
	"context"
	"errors"
	"testing"
)

func stopped(b *Budget, terms int) (err error) {
	defer Catch(&err)
	b.Check(terms)
	return nil
}

func TestUnlimited(t *testing.T) {
	var none *Budget
	none.Stage("anything")
	if err := stopped(none, 1<<40); err != nil || none.StageName() != "" {
		t.Errorf("a nil budget stops with %v at %q", err, none.StageName())
	}
	if err := stopped(New(context.Background(), 0), 1<<40); err != nil {
		t.Errorf("no limit on terms stops with %v", err)
	}
}

func TestTerms(t *testing.T) {
	b := New(context.Background(), 100)
	b.Stage("eliminating alpha")
	if err := stopped(b, 100); err != nil {
		t.Errorf("at the limit: %v", err)
	}
	var stop *Stop
	if err := stopped(b, 101); !errors.As(err, &stop) || stop.Reason != Terms || stop.Limit != 100 || stop.Stage != "eliminating alpha" {
		t.Errorf("past the limit: %v", err)
	}
	if got := stop.Error(); got != "a result has more than 100 terms; stopped while eliminating alpha" {
		t.Errorf("message %q", got)
	}
}

func TestInterruption(t *testing.T) {
	why := errors.New("interrupted by the user")
	ctx, cancel := context.WithCancelCause(context.Background())
	b := New(ctx, 0)
	if err := stopped(b, 1); err != nil {
		t.Errorf("before the interruption: %v", err)
	}
	cancel(why)
	if err := stopped(b, 1); !errors.Is(err, why) || err.Error() != "interrupted by the user; stopped while starting" {
		t.Errorf("after the interruption: %v", err)
	}
}

func TestOtherPanicsPass(t *testing.T) {
	defer func() {
		if r := recover(); r != "a fault" {
			t.Errorf("recovered %v, want the fault itself", r)
		}
	}()
	var err error
	func() {
		defer Catch(&err)
		panic("a fault")
	}()
	t.Error("the panic was swallowed")
}
