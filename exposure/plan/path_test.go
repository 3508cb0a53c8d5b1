package plan

import "testing"

func TestPath(t *testing.T) {
	p := demo("kf-07-weld-2")
	for path, want := range map[string]any{"source.tube.kv": 180.0, "part.layers[1].mm": 7.1, "part.sections[0].layers[1].mm": 9.1, "detector.film.class": "C4", "detector.film.screensMM[1]": 0.1, "plan": 1} {
		if got, ok := p.Value(path); !ok || got != want {
			t.Errorf("%s: %v, %v, want %v", path, got, ok, want)
		}
	}
	for _, path := range []string{"", "source.sealed.sizeMM", "part.layers[2].mm", "part.layers[x]", "part.layers[-1].mm", "nothing", "source.tube.kv.more", "at", "source", "at.wall", "[0]", "part.layers["} {
		if got, ok := p.Value(path); ok {
			t.Errorf("%q: %v stands there", path, got)
		}
	}
	q, err := p.With("part.layers[1].mm", 8)
	if err != nil || q.Part.Layers[1].MM != 8 || p.Part.Layers[1].MM != 7.1 {
		t.Errorf("%v, %v, or the plan itself was changed", q.Part.Layers, err)
	}
	p.Detector.Film.ScreensMM = nil
	if q, err = p.With("detector.film.screensMM[1]", 0.2); err != nil || q.Detector.Film.ScreensMM[1] != 0.2 {
		t.Errorf("screens: %v, %v", q.Detector.Film, err)
	}
	if q, err = p.With("setup.shots", 6.0); err != nil || q.Setup.Shots != 6 {
		t.Errorf("shots: %v, %v", q.Setup, err)
	}
	for path, bad := range map[string]any{"setup.shots": 5.5, "detector.film.class": 5, "setup.sfdMM": "700", "source": 1, "site.limits[3].name": "x"} {
		if _, err := p.With(path, bad); err == nil {
			t.Errorf("%s takes %v", path, bad)
		}
	}
}
