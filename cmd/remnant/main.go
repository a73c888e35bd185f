package main

// The program's frame: streams, signals, the exit status, and the only recover.

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"runtime/debug"
	"syscall"

	"remnant/expr/budget"
	"remnant/parse/diag"
	"remnant/reduce"
)

// Exit statuses.
const (
	statusDone     = 0
	statusDiffers  = 1  // a check failed
	statusRefused  = 2  // the input was refused
	statusStopped  = 3  // a limit was reached, or the run was interrupted
	statusInternal = 70 // a fault of the program
)

// streams are what a command reads and writes, and the end of the run.
type streams struct {
	in   io.Reader
	out  io.Writer
	err  io.Writer
	stop <-chan struct{} // closed by an interrupt; nil: never
}

func main() {
	os.Exit(run(os.Args[1:], streams{in: os.Stdin, out: os.Stdout, err: os.Stderr}))
}

// run executes one command line and returns its exit status.
func run(args []string, std streams) (status int) {
	defer func() {
		if v := recover(); v != nil {
			fmt.Fprintf(std.err, "remnant: an internal fault: %v\n", v)
			fmt.Fprintln(std.err, "this is a fault of the program; please report it together with the model")
			fmt.Fprintf(std.err, "\n%s", debug.Stack())
			status = statusInternal
		}
	}()
	ctx, stop := interruptible()
	defer stop()
	std.stop = ctx.Done()
	root := newRoot(std)
	root.SetArgs(args)
	return report(std.err, root.ExecuteContext(ctx))
}

var errInterrupted = errors.New("interrupted")

// interruptible returns a context that the first SIGINT or SIGTERM cancels; the second one
// ends the program at once.
func interruptible() (context.Context, func()) {
	ctx, cancel := context.WithCancelCause(context.Background())
	signals := make(chan os.Signal, 1)
	signal.Notify(signals, os.Interrupt, syscall.SIGTERM)
	go func() {
		select {
		case <-signals:
			signal.Stop(signals)
			cancel(errInterrupted)
		case <-ctx.Done():
		}
	}()
	return ctx, func() {
		signal.Stop(signals)
		cancel(nil)
	}
}

// refusal is a fault of the command line or of a file, in one line, with what would help.
type refusal struct{ summary, hint string }

func (r *refusal) Error() string { return r.summary }

// differs is the outcome of a check that failed.
type differs struct{ summary string }

func (d *differs) Error() string { return d.summary }

// report writes what went wrong and returns the exit status.
func report(w io.Writer, err error) int {
	var (
		faults  diag.List
		stop    *budget.Stop
		refused *refusal
		check   *differs
		open    *unproven
	)
	switch {
	case err == nil:
		return statusDone
	case errors.As(err, &faults):
		if werr := diag.Render(w, faults); werr != nil {
			return statusRefused // standard error is gone; there is nowhere to say it
		}
		return statusRefused
	case errors.As(err, &stop):
		fmt.Fprintf(w, "remnant: %v\n", stop)
		return statusStopped
	case errors.As(err, &open):
		fmt.Fprintf(w, "remnant: %s\n", open.Error())
		return statusStopped
	case errors.As(err, &check):
		fmt.Fprintf(w, "remnant: %s\n", check.summary)
		return statusDiffers
	case errors.As(err, &refused):
		fmt.Fprintf(w, "remnant: %s\n", refused.summary)
		if refused.hint != "" {
			fmt.Fprintf(w, "  %s\n", refused.hint)
		}
		return statusRefused
	case errors.Is(err, reduce.ErrCount):
		fmt.Fprintf(w, "remnant: %v\n", err)
		return statusInternal
	}
	fmt.Fprintf(w, "remnant: %v\n", err)
	return statusRefused
}
