package exposure

import (
	"fmt"
	"io"
	"math"
	"strings"
	"time"

	"halfvalue/exposure/boundary"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/working"
)

// Report prints a reckoning as a crew reads it. Figures are rounded: times to
// a second, boundaries outward.
func Report(w io.Writer, p plan.Plan, r Reckoning) error {
	b := &strings.Builder{}
	if p.Title != "" {
		fmt.Fprintln(b, p.Title)
	}
	low, high := Clock(r.Exposure.SecondsLow), Clock(r.Exposure.SecondsHigh)
	fmt.Fprintf(b, "exposure     %s   (%s to %s)\n", Clock(r.Exposure.Seconds), low, high)
	if m := r.Exposure.MAMin; m != nil {
		fmt.Fprintf(b, "             %.3g mA min\n", *m)
	}
	if m := r.Exposure.GBqMin; m != nil {
		fmt.Fprintf(b, "             %.4g GBq min (%.4g Ci min), source at %.4g GBq (%.4g Ci)\n", *m, *m/plan.GBqPerCi, r.Source.ActivityGBq, r.Source.ActivityCi)
	}
	fmt.Fprintf(b, "beam         mean %.0f keV, %.3g mGy/min at 1 m\n", r.Beam.MeanKeV, r.Beam.KermaRateMGyPerMinAt1m)
	fmt.Fprintf(b, "geometry     SFD %.4g mm, f %.4g mm, b %.4g mm, Ug %.2f mm\n", r.Geometry.SFDMM, r.Geometry.FMM, r.Geometry.BMM, r.Geometry.UgMM)
	for _, d := range r.Density {
		fmt.Fprintf(b, "density      %.2f at %s, %.4g mm\n", d.Density, d.At, d.ThicknessMM)
	}
	for _, d := range r.SNR {
		fmt.Fprintf(b, "SNR_N        %.0f at %s, %.4g mm\n", d.SNRn, d.At, d.ThicknessMM)
	}
	reportSpread(b, r.Spread)
	for _, c := range r.Checks {
		fmt.Fprintf(b, "check        %-9s %s\n", c.Verdict, c.Text)
		if c.Mend != nil {
			fmt.Fprintf(b, "             mend: %s\n", c.Mend.Text)
		}
	}
	reportRopes(b, r.Boundary)
	for _, d := range r.Defaults {
		fmt.Fprintf(b, "default      %s = %s: %s\n", d.Field, d.Value, d.Why)
	}
	for _, c := range r.Cautions {
		fmt.Fprintf(b, "caution      %s\n", c)
	}
	_, err := io.WriteString(w, b.String())
	return err
}

func reportSpread(b *strings.Builder, list []Contribution) {
	if len(list) == 0 {
		return
	}
	var names []string
	for _, c := range list[:min(3, len(list))] {
		names = append(names, fmt.Sprintf("%s %.0f %%", c.Name, c.Relative*100))
	}
	fmt.Fprintf(b, "spread       x/%.2f (two deviations); most from %s\n", math.Exp(coverage*total(list)), strings.Join(names, ", "))
}

func reportRopes(b *strings.Builder, lines []boundary.Line) {
	for _, l := range lines {
		if l.Within {
			fmt.Fprintf(b, "boundary     %-9s %-20s within 1 m\n", l.Direction, l.Limit)
			continue
		}
		m := boundary.RoundOutM(l.RopeMetres)
		fmt.Fprintf(b, "boundary     %-9s %-20s %g m (%.0f ft)\n", l.Direction, l.Limit, m, math.Ceil(m/0.3048))
	}
}

// Clock writes a time as a crew says it: "95 s", "4 min 10 s", "1 h 05 min".
func Clock(seconds float64) string {
	d := time.Duration(math.Round(seconds)) * time.Second
	switch {
	case seconds < 9.95:
		return fmt.Sprintf("%.1f s", seconds)
	case d < 2*time.Minute:
		return fmt.Sprintf("%d s", int(d.Seconds()))
	case d < time.Hour:
		return fmt.Sprintf("%d min %02d s", int(d.Minutes()), int(d.Seconds())%60)
	}
	return fmt.Sprintf("%d h %02d min", int(d.Hours()), int(d.Minutes())%60)
}

// ReportWorking prints the steps behind every number.
func ReportWorking(w io.Writer, r Reckoning) error {
	b := &strings.Builder{}
	for _, s := range r.Workings {
		writeStep(b, s)
	}
	_, err := io.WriteString(w, b.String())
	return err
}

func writeStep(b *strings.Builder, s working.Step) {
	fmt.Fprintf(b, "\n%s\n  %s\n", s.Name, s.Formula)
	for _, in := range s.Inputs {
		value := fmt.Sprintf("%.6g", in.Value)
		if in.Text != "" {
			value = in.Text
		}
		line := fmt.Sprintf("    %s = %s %s", in.Symbol, value, in.Unit)
		if in.Name != "" {
			line += "  " + in.Name
		}
		if in.Source != "" {
			line += "  [" + in.Source + "]"
		}
		fmt.Fprintln(b, line)
	}
	fmt.Fprintf(b, "  %s = %.6g %s\n", s.Symbol, s.Value, s.Unit)
	if s.Source != "" {
		fmt.Fprintf(b, "  source: %s\n", s.Source)
	}
	if s.Note != "" {
		fmt.Fprintf(b, "  note: %s\n", s.Note)
	}
}
