package team_test

import (
	"runtime"
	"sync/atomic"
	"testing"
	"time"

	"example.org/overturn/stokes/internal/team"
	"github.com/stretchr/testify/require"
)

func TestEveryPartIsDoneOnce(t *testing.T) {
	for _, size := range []int{1, 2, 3, 5} {
		tm := team.New(size)
		require.Equal(t, size, tm.Size())
		calls := make([]atomic.Int32, size)
		count := func(part int) { calls[part].Add(1) }
		for round := range 300 {
			if round%100 == 50 {
				time.Sleep(2 * time.Millisecond) // let them fall asleep
			}
			tm.Run(count)
			for p := range calls {
				if got := calls[p].Load(); got != int32(round+1) {
					t.Fatalf("size %d, round %d: part %d was done %d times", size, round, p, got)
				}
			}
		}
	}
}

func TestPartsRunAtTheSameTime(t *testing.T) {
	// Each part waits for the other.
	tm := team.New(2)
	var here [2]chan struct{}
	for i := range here {
		here[i] = make(chan struct{}, 1)
	}
	for range 20 {
		tm.Run(func(part int) {
			here[part] <- struct{}{}
			<-here[1-part]
		})
	}
}

func TestMembersEndWithTheirTeam(t *testing.T) {
	before := runtime.NumGoroutine()
	tm := team.New(4)
	tm.Run(func(int) { _ = tm.Size() }) // a task that refers to its team
	tm = nil
	for range 100 {
		runtime.GC()
		time.Sleep(5 * time.Millisecond)
		if runtime.NumGoroutine() <= before {
			return
		}
	}
	t.Errorf("%d goroutines after the team was dropped, %d before it was made", runtime.NumGoroutine(), before)
}

func TestRoundsDoNotAllocate(t *testing.T) {
	tm := team.New(2)
	task := func(int) {}
	allocs := testing.AllocsPerRun(20, func() {
		for range 10 {
			tm.Run(task)
		}
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
	task := func(int) {}
	for b.Loop() {
		tm.Run(task)
	}
}
