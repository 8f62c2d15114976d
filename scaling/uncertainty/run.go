package uncertainty

import (
	"context"
	"errors"
	"fmt"
	"math"
	"runtime"
	"slices"
	"sync"
	"sync/atomic"
)

// Func is a calculation: it fills out, one value an output, from in, one value an
// input. It is called from several goroutines at once and must not keep or
// change in.
type Func func(in, out []float64) error

// Defaults of [Settings].
const (
	DefaultSamples = 1000
	DefaultLevel   = 0.95
)

// Settings tunes a study. A nil *Settings, or a zero field, means the default.
type Settings struct {
	// Samples is the number of evaluations. Default [DefaultSamples].
	Samples int

	// Seed starts the random numbers: equal seeds give equal studies. Zero is a
	// seed like any other.
	Seed uint64

	// Workers is the number of goroutines. It changes the time a study takes,
	// never its result. Default runtime.GOMAXPROCS(0).
	Workers int

	// Failures is the share of samples that may fail, with an error or a value
	// that is not finite, before the study as a whole does. Results are then
	// those of the samples that did not fail: of the cases that make sense.
	// Default 0.
	Failures float64

	// Progress, if not nil, is told now and then how many samples are done, from
	// one goroutine at a time.
	Progress func(done, samples int)
}

func (s *Settings) resolve() (Settings, error) {
	r := Settings{}
	if s != nil {
		r = *s
	}
	if r.Samples == 0 {
		r.Samples = DefaultSamples
	}
	if r.Workers == 0 {
		r.Workers = runtime.GOMAXPROCS(0)
	}
	switch {
	case r.Samples < 10:
		return r, &FieldError{Package: string(pkg), Field: "Settings.Samples", Value: fmt.Sprint(r.Samples), Want: ">= 10"}
	case r.Workers < 0:
		return r, &FieldError{Package: string(pkg), Field: "Settings.Workers", Value: fmt.Sprint(r.Workers), Want: ">= 0"}
	case !(r.Failures >= 0 && r.Failures < 1):
		return r, &FieldError{Package: string(pkg), Field: "Settings.Failures", Value: fmt.Sprint(r.Failures), Want: ">= 0 and < 1"}
	}
	return r, nil
}

// ErrFailed reports that more samples failed than Settings.Failures allows. The
// error that wraps it is a [*SampleError].
var ErrFailed = errors.New("too many samples failed")

// SampleError says how many samples failed, and how the first of them did.
type SampleError struct {
	Failed, Samples int
	Sample          int       // number of the first
	Inputs          []float64 // its inputs
	Err             error     // what it returned
}

// Error counts the failures and describes the first.
func (e *SampleError) Error() string {
	return fmt.Sprintf("uncertainty: %v: %d of %d, first sample %d with inputs %.6g: %v", ErrFailed, e.Failed, e.Samples, e.Sample, e.Inputs, e.Err)
}

// Unwrap returns [ErrFailed] and the error of the first sample.
func (e *SampleError) Unwrap() []error { return []error{ErrFailed, e.Err} }

// Run draws samples of the inputs and evaluates f on each.
func Run(ctx context.Context, inputs []Input, outputs []string, f Func, settings *Settings) (*Ensemble, error) {
	s, err := settings.resolve()
	if err != nil {
		return nil, err
	}
	if err := checkStudy(inputs, outputs, f); err != nil {
		return nil, err
	}
	x, err := design(inputs, s.Samples, s.Seed, 0)
	if err != nil {
		return nil, err
	}
	e := &Ensemble{inputs: slices.Clone(inputs), outputs: slices.Clone(outputs)}
	y, failures, err := evaluate(ctx, x, len(inputs), len(outputs), f, s)
	if err != nil {
		return nil, err
	}
	if err := tooMany(failures, x, len(inputs), s); err != nil {
		return nil, err
	}
	e.collect(x, y, failures)
	return e, nil
}

func checkStudy(inputs []Input, outputs []string, f Func) error {
	if err := checkInputs(inputs); err != nil {
		return err
	}
	if len(outputs) == 0 {
		return &FieldError{Package: string(pkg), Field: "outputs", Value: "none", Want: "at least one"}
	}
	for i, name := range outputs {
		if name == "" || slices.Contains(outputs[:i], name) {
			return &FieldError{Package: string(pkg), Field: fmt.Sprintf("outputs[%d]", i), Value: fmt.Sprintf("%q", name), Want: "a name of its own"}
		}
	}
	if f == nil {
		return &FieldError{Package: string(pkg), Field: "function", Value: "nil", Want: "a function"}
	}
	return nil
}

// evaluate calls f on every row of x. A row that fails has its error in the
// slice returned, at its place.
func evaluate(ctx context.Context, x []float64, inputs, outputs int, f Func, s Settings) ([]float64, []error, error) {
	n := len(x) / inputs
	y := make([]float64, n*outputs)
	failures := make([]error, n)
	const block = 16 // samples that a worker takes at a time
	var next, done atomic.Int64
	var report sync.Mutex
	var wg sync.WaitGroup
	for range min(s.Workers, (n+block-1)/block) {
		wg.Go(func() {
			in := make([]float64, inputs)
			for ctx.Err() == nil {
				first := int(next.Add(block)) - block
				if first >= n {
					return
				}
				last := min(first+block, n)
				for i := first; i < last; i++ {
					copy(in, x[i*inputs:]) // f may keep no hold on the design
					failures[i] = one(f, in, y[i*outputs:(i+1)*outputs])
				}
				total := done.Add(int64(last - first))
				if s.Progress != nil {
					report.Lock()
					s.Progress(int(total), n)
					report.Unlock()
				}
			}
		})
	}
	wg.Wait()
	if err := ctx.Err(); err != nil {
		return nil, nil, fmt.Errorf("uncertainty: after %d of %d samples: %w", done.Load(), n, err)
	}
	return y, failures, nil
}

func one(f Func, in, out []float64) error {
	if err := f(in, out); err != nil {
		return err
	}
	for k, v := range out {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return fmt.Errorf("output %d is %v", k, v)
		}
	}
	return nil
}

func tooMany(failures []error, x []float64, inputs int, s Settings) error {
	first, count := -1, 0
	for i, err := range failures {
		if err != nil {
			if count++; first < 0 {
				first = i
			}
		}
	}
	if float64(count) <= s.Failures*float64(len(failures)) {
		return nil
	}
	return &SampleError{
		Failed: count, Samples: len(failures), Sample: first,
		Inputs: slices.Clone(x[first*inputs : (first+1)*inputs]), Err: failures[first],
	}
}
