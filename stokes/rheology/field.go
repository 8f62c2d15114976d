package rheology

import "fmt"

// positive, notNegative and anyFinite check one field of a law by its name.

func positive(name string, v float64) error {
	if finite(v) && v > 0 {
		return nil
	}
	return fmt.Errorf("rheology: %s is %g, want finite and > 0", name, v)
}

func notNegative(name string, v float64) error {
	if finite(v) && v >= 0 {
		return nil
	}
	return fmt.Errorf("rheology: %s is %g, want finite and >= 0", name, v)
}

func anyFinite(name string, v float64) error {
	if finite(v) {
		return nil
	}
	return fmt.Errorf("rheology: %s is %g, want a finite number", name, v)
}

// first returns the first error that is not nil.
func first(errs ...error) error {
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	return nil
}

// orDefault reads a field whose zero value means something else.
func orDefault(v, otherwise float64) float64 {
	if v == 0 {
		return otherwise
	}
	return v
}
