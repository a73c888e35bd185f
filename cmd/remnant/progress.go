package main

// The stage of long work, on a terminal only and only after a second.

import (
	"io"
	"os"
	"sync"
	"time"

	"github.com/schollz/progressbar/v3"
	"golang.org/x/term"

	"remnant/expr/budget"
)

const (
	progressDelay = time.Second
	progressStep  = 100 * time.Millisecond
)

// watch shows the stage that b is at until the returned function is called. It shows nothing
// if w is no terminal.
func watch(w io.Writer, b *budget.Budget) (done func()) {
	if !isTerminal(w) {
		return func() {}
	}
	stop := make(chan struct{})
	var finished sync.WaitGroup
	finished.Add(1)
	go func() {
		defer finished.Done()
		spin(w, b, stop)
	}()
	return func() {
		close(stop)
		finished.Wait()
	}
}

func spin(w io.Writer, b *budget.Budget, stop <-chan struct{}) {
	select {
	case <-stop:
		return
	case <-time.After(progressDelay):
	}
	bar := progressbar.NewOptions(-1,
		progressbar.OptionSetWriter(w),
		progressbar.OptionSpinnerType(14),
		progressbar.OptionSetElapsedTime(false),
		progressbar.OptionClearOnFinish(),
	)
	tick := time.NewTicker(progressStep)
	defer tick.Stop()
	for {
		bar.Describe(b.StageName())
		if bar.Add(1) != nil {
			return
		}
		select {
		case <-stop:
			bar.Finish()
			return
		case <-tick.C:
		}
	}
}

// isTerminal reports whether w is a terminal.
func isTerminal(w any) bool {
	f, ok := w.(*os.File)
	return ok && term.IsTerminal(int(f.Fd()))
}

// terminalWidth is the width of the terminal w, or that of a page in a pipe.
func terminalWidth(w any) int {
	if f, ok := w.(*os.File); ok {
		if n, _, err := term.GetSize(int(f.Fd())); err == nil && n > 0 {
			return n
		}
	}
	return pageWidth
}

// pageWidth is the width of text that does not go to a terminal.
const pageWidth = 100

// inColour reports whether text for w may be marked up: on a terminal that can, unless
// NO_COLOR is set.
func inColour(w any) bool {
	return isTerminal(w) && os.Getenv("NO_COLOR") == "" && os.Getenv("TERM") != "dumb"
}
