package team_test

import (
	"sync/atomic"
	"testing"
	"time"

	"example.org/overturn/stokes/internal/team"
)

func TestEveryMemberWorksOnceARound(t *testing.T) {
	for _, size := range []int{1, 2, 3, 5} {
		tm := team.New(size)
		calls := make([]atomic.Int32, size)
		count := func(member int) { calls[member].Add(1) }
		tm.Run(count) // not started: all by the caller
		tm.Start()
		for round := range 100 {
			if round == 50 {
				time.Sleep(5 * time.Millisecond) // let them fall asleep
			}
			tm.Run(count)
			for m := range calls {
				if got := calls[m].Load(); got != int32(round+2) {
					t.Fatalf("size %d, round %d: member %d was called %d times", size, round, m, got)
				}
			}
		}
		tm.Stop()
		tm.Start() // can be used again
		tm.Run(count)
		tm.Stop()
		for m := range calls {
			if got := calls[m].Load(); got != 102 {
				t.Errorf("size %d: member %d was called %d times after a restart", size, m, got)
			}
		}
	}
}

func TestRoundsDoNotAllocate(t *testing.T) {
	tm := team.New(2)
	task := func(int) {}
	allocs := testing.AllocsPerRun(20, func() {
		tm.Start()
		for range 10 {
			tm.Run(task)
		}
		tm.Stop()
	})
	if allocs != 0 {
		t.Errorf("%v allocations a round", allocs)
	}
}

func TestBlocksCoverAllItemsOnce(t *testing.T) {
	for _, n := range []int{0, 1, 7, 64} {
		for size := 1; size <= 5; size++ {
			next := 0
			for m := range size {
				lo, hi := team.Block(n, m, size)
				if lo != next || hi < lo {
					t.Fatalf("n %d, size %d: block %d is [%d, %d), want it to start at %d", n, size, m, lo, hi, next)
				}
				next = hi
			}
			if next != n {
				t.Errorf("n %d, size %d: blocks end at %d", n, size, next)
			}
		}
	}
}

func BenchmarkRound(b *testing.B) {
	tm := team.New(2)
	tm.Start()
	defer tm.Stop()
	task := func(int) {}
	for b.Loop() {
		tm.Run(task)
	}
}
