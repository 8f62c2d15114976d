package exact

import "fmt"

// positive, notNegative and anyFinite check one field of a solution by its
// name.

func positive(name string, v float64) error {
	if v > 0 && v < far {
		return nil
	}
	return fmt.Errorf("exact: %s is %g, want finite and > 0", name, v)
}

func notNegative(name string, v float64) error {
	if v >= 0 && v < far {
		return nil
	}
	return fmt.Errorf("exact: %s is %g, want finite and >= 0", name, v)
}

func anyFinite(name string, v float64) error {
	if v > -far && v < far {
		return nil
	}
	return fmt.Errorf("exact: %s is %g, want a finite number", name, v)
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

// orOne reads a field whose zero value means 1.
func orOne(v float64) float64 {
	if v == 0 {
		return 1
	}
	return v
}
