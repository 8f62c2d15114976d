// Package team runs short pieces of work on a fixed set of goroutines.
//
// One cycle of a multigrid solver on 256 by 256 cells is some hundred passes
// of a few microseconds each. Waking a goroutine for each of them would cost
// more than it gains, so the members of a [Team] look out for work for a while
// before they sleep. And as the cores may be busy with other programs, nobody
// waits for a member that has not begun: the caller does its share as well.
package team

import (
	"runtime"
	"sync/atomic"
)

// A Team is a number of goroutines that share out the parts of one task after
// the other. They start with the first task and sleep when there is none; they
// end when the Team is garbage. A team serves one caller at a time.
type Team struct {
	*work
	started bool
}

// work is what members know, which must not include the Team: as long as
// they refer to it, it is not garbage.
type work struct {
	size    int
	task    func(part int)
	ticket  atomic.Uint64 // round in the upper bits, next part in the lower
	done    atomic.Int32  // parts finished in this round
	quit    atomic.Bool
	members []member
}

type member struct {
	asleep atomic.Bool
	wake   chan struct{}
	_      [64]byte // members look at their own cache line
}

const partBits = 16

// How long a member without work stays awake: first looking at the ticket all
// the time, then giving way to other goroutines between looks.
const (
	looks  = 2000
	yields = 100
)

// New returns a team of the given size, at least one, the caller of Run
// included.
func New(size int) *Team {
	w := &work{size: min(max(1, size), 1<<partBits-1)}
	w.members = make([]member, w.size-1)
	for i := range w.members {
		w.members[i].wake = make(chan struct{}, 1)
	}
	w.ticket.Store(uint64(w.size)) // nothing to do
	return &Team{work: w}
}

// Size returns the number of members.
func (t *Team) Size() int { return t.size }

// Run calls task once for each part 0 to Size-1, on as many goroutines as are
// free, and returns when all calls have. Parts must not depend on each other.
func (t *Team) Run(task func(part int)) {
	if t.size == 1 {
		task(0)
		return
	}
	if !t.started {
		t.start()
	}
	w := t.work
	w.task = task
	w.done.Store(0)
	round := w.ticket.Load()>>partBits + 1
	w.ticket.Store(round << partBits)
	for i := range w.members {
		if m := &w.members[i]; m.asleep.CompareAndSwap(true, false) {
			m.wake <- struct{}{}
		}
	}
	for w.part() {
	}
	for look := 0; w.done.Load() != int32(w.size); look++ {
		if look > looks {
			runtime.Gosched()
		}
	}
	w.task = nil // it may refer to the Team, which would then never be garbage
}

func (t *Team) start() {
	t.started = true
	for i := range t.members {
		go t.work.serve(&t.members[i])
	}
	runtime.AddCleanup(t, func(w *work) {
		w.quit.Store(true)
		for i := range w.members {
			close(w.members[i].wake)
		}
	}, t.work)
}

// part does the next part of the present task, or reports that none is left.
func (w *work) part() bool {
	for {
		v := w.ticket.Load()
		next := int(v & (1<<partBits - 1))
		if next >= w.size {
			return false
		}
		// The round is part of the ticket, so that this fails when the part
		// belongs to a task that is over.
		if w.ticket.CompareAndSwap(v, v+1) {
			w.task(next)
			w.done.Add(1)
			return true
		}
	}
}

func (w *work) serve(m *member) {
	for look := 0; !w.quit.Load(); look++ {
		switch {
		case w.part():
			look = 0
		case look < looks:
		case look < looks+yields:
			runtime.Gosched()
		default:
			m.asleep.Store(true)
			// A task may have come between the look and the store: then its
			// caller either saw the flag and sends, or did not and the flag is
			// taken back here.
			if w.waiting() && m.asleep.CompareAndSwap(true, false) {
				break
			}
			<-m.wake
			look = 0
		}
	}
}

// waiting reports whether a part has not been taken.
func (w *work) waiting() bool {
	return int(w.ticket.Load()&(1<<partBits-1)) < w.size
}

// Block returns the part of n items, numbered from 0, that belongs to one of
// size parts: from lo up to but not including hi. Parts differ by at most one
// item.
func Block(n, part, size int) (lo, hi int) {
	return n * part / size, n * (part + 1) / size
}
