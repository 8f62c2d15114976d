// Package team runs short pieces of work on a fixed set of goroutines.
//
// One cycle of a multigrid solver on 256 by 256 cells is some hundred passes
// of a few microseconds each. Waking a goroutine for each of them would cost
// more than it gains, so the members of a [Team] spin for a while before they
// sleep.
package team

import (
	"runtime"
	"sync/atomic"
)

// A Team is a number of goroutines that work on the same task at the same
// time. The goroutine that calls [Team.Run] is member 0. A team serves one
// caller at a time.
type Team struct {
	members []*member

	task    func(member int)
	round   atomic.Uint32
	pending atomic.Int32
	started bool
}

type member struct {
	number int
	seen   uint32
	asleep atomic.Bool
	wake   chan struct{}
	body   func() // the goroutine, kept so that starting it allocates nothing
	_      [64]byte
}

// How long a member without work stays awake: first looking at the round
// counter all the time, then giving way to other goroutines between looks.
const (
	looks  = 3000
	yields = 200
)

// New returns a team of the given number of members, at least one.
func New(members int) *Team {
	t := &Team{}
	for i := 1; i < members; i++ {
		m := &member{number: i, wake: make(chan struct{}, 1)}
		m.body = func() { t.serve(m) }
		t.members = append(t.members, m)
	}
	return t
}

// Size returns the number of members, the caller of Run included.
func (t *Team) Size() int { return len(t.members) + 1 }

// Start starts the goroutines. Between Start and Stop, Run is concurrent;
// outside it does all the work itself.
func (t *Team) Start() {
	if t.started {
		return
	}
	t.started = true
	for _, m := range t.members {
		m.seen = t.round.Load()
		go m.body()
	}
}

// Stop ends the goroutines and waits until they have left their last task.
func (t *Team) Stop() {
	if !t.started {
		return
	}
	t.call(nil)
	t.started = false
}

// Run calls task once for each member, with the member's number, and returns
// when all calls have. The task must not depend on the order.
func (t *Team) Run(task func(member int)) {
	if !t.started {
		for i := range t.Size() {
			task(i)
		}
		return
	}
	t.call(task)
}

// call gives the task to all members; a nil task ends them.
func (t *Team) call(task func(member int)) {
	t.task = task
	t.pending.Store(int32(len(t.members)))
	t.round.Add(1)
	for _, m := range t.members {
		if m.asleep.CompareAndSwap(true, false) {
			m.wake <- struct{}{}
		}
	}
	if task != nil {
		task(0)
	}
	for look := 0; t.pending.Load() != 0; look++ {
		if look > looks {
			runtime.Gosched()
		}
	}
}

func (t *Team) serve(m *member) {
	for {
		t.await(m)
		m.seen++
		task := t.task
		if task != nil {
			task(m.number)
		}
		t.pending.Add(-1)
		if task == nil {
			return
		}
	}
}

// await returns when the round counter has moved on.
func (t *Team) await(m *member) {
	for look := 0; t.round.Load() == m.seen; look++ {
		switch {
		case look < looks:
		case look < looks+yields:
			runtime.Gosched()
		default:
			m.asleep.Store(true)
			// The caller may have started a round between the test and the
			// store: then it either sees the flag and sends, or it does not
			// and the flag is taken back here.
			if t.round.Load() != m.seen && m.asleep.CompareAndSwap(true, false) {
				return
			}
			<-m.wake
			return
		}
	}
}

// Block returns the part of n items, numbered from 0, that belongs to one of
// size members: from lo up to but not including hi. Parts differ by at most
// one item.
func Block(n, member, size int) (lo, hi int) {
	return n * member / size, n * (member + 1) / size
}
