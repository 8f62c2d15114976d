package trial

import (
	"fmt"
	"strings"
)

// String is a table with a line a case: the errors on the finest grid, the
// observed orders and how many checks held, and below it the failures.
func (r *Report) String() string {
	var b strings.Builder
	quantities := r.quantities()
	width := len("case")
	for _, res := range r.Results {
		width = max(width, len(res.Name))
	}
	fmt.Fprintf(&b, "%-*s  %-9s", width, "case", "finest")
	for _, q := range quantities {
		fmt.Fprintf(&b, "  %13s", q)
	}
	fmt.Fprintf(&b, "  %6s\n", "checks")
	for _, res := range r.Results {
		fmt.Fprintf(&b, "%-*s  %s\n", width, res.Name, res.line(quantities))
	}
	for _, res := range r.Results {
		for _, f := range res.Failures() {
			fmt.Fprintln(&b, f)
		}
	}
	return b.String()
}

// quantities lists the quantities that any case has, in order of appearance.
func (r *Report) quantities() []string {
	var list []string
	seen := map[string]bool{}
	for _, res := range r.Results {
		for _, c := range res.Convergence {
			if !seen[c.Quantity] {
				seen[c.Quantity] = true
				list = append(list, c.Quantity)
			}
		}
	}
	return list
}

func (r Result) line(quantities []string) string {
	if r.Skipped != nil {
		return fmt.Sprintf("skipped: %v", r.Skipped)
	}
	if r.Err != nil {
		return "FAILED"
	}
	var b strings.Builder
	finest := ""
	if len(r.Grids) > 0 {
		finest = r.Grids[len(r.Grids)-1]
	}
	fmt.Fprintf(&b, "%-9s", finest)
	for _, q := range quantities {
		cell := "-"
		for _, c := range r.Convergence {
			if c.Quantity == q {
				cell = fmt.Sprintf("%.1e %5.2f", c.Last(), c.Observed)
			}
		}
		fmt.Fprintf(&b, "  %13s", cell)
	}
	held := 0
	for _, c := range r.Checks {
		if c.Passed() {
			held++
		}
	}
	fmt.Fprintf(&b, "  %6s  %s", fmt.Sprintf("%d/%d", held, len(r.Checks)), verdict(len(r.Failures()) == 0))
	return b.String()
}

func verdict(passed bool) string {
	if passed {
		return "ok"
	}
	return "FAILED"
}

// String is a table of the errors on every grid, the orders and the checks.
func (r Result) String() string {
	var b strings.Builder
	fmt.Fprintf(&b, "%s (%s)\n", r.Name, r.Source)
	switch {
	case r.Skipped != nil:
		fmt.Fprintf(&b, "  skipped: %v\n", r.Skipped)
		return b.String()
	case r.Err != nil:
		fmt.Fprintf(&b, "  FAILED: %v\n", r.Err)
		return b.String()
	}
	row := func(name string, cell func(c Convergence) string) {
		fmt.Fprintf(&b, "  %-10s", name)
		for _, c := range r.Convergence {
			fmt.Fprintf(&b, "  %11s", cell(c))
		}
		fmt.Fprintln(&b)
	}
	row("cells", func(c Convergence) string { return c.Quantity })
	for i, g := range r.Grids {
		row(g, func(c Convergence) string { return fmt.Sprintf("%.2e", c.Errors[i]) })
	}
	row("order", func(c Convergence) string { return fmt.Sprintf("%.2f", c.Observed) })
	row("expected", func(c Convergence) string {
		if c.Expected == 0 {
			return "-"
		}
		return fmt.Sprintf("%.2f", c.Expected)
	})
	row("", func(c Convergence) string { return verdict(c.Passed()) })
	for _, c := range r.Checks {
		fmt.Fprintf(&b, "  %-30s %.1e, want <= %.1e  %s\n", c.Name, c.Value, c.Limit, verdict(c.Passed()))
	}
	return b.String()
}
