package setup

import (
	"fmt"
	"slices"
	"sync"
)

// PipeSize is a nominal size with its walls.
type PipeSize struct {
	NPS    string // nominal size in inches as the trade says it, "6", "1-1/4"
	DN     int    // the same in the metric series
	ODMM   float64
	Walls  []Wall
	Source string
	Trust  string // confidence of the row
}

// Wall is a wall of a pipe by its schedule.
type Wall struct {
	Schedule string  `json:"schedule"` // "40", "XS"
	MM       float64 `json:"mm"`
}

type pipeTable struct {
	Source     string `json:"source"`
	Confidence string `json:"confidence"`
	Pipes      []struct {
		NPS   string  `json:"nps"`
		DN    int     `json:"dn"`
		ODMM  float64 `json:"odMM"`
		Walls []Wall  `json:"walls"`
	} `json:"pipes"`
}

var pipes = sync.OnceValue(func() pipeTable { return load[pipeTable]("pipes.json") })

// PipeSizes gives the pipe table from the smallest size to the largest.
func PipeSizes() []PipeSize {
	t := pipes()
	list := make([]PipeSize, len(t.Pipes))
	for i, p := range t.Pipes {
		list[i] = PipeSize{p.NPS, p.DN, p.ODMM, slices.Clone(p.Walls), t.Source, t.Confidence}
	}
	return list
}

// PipeBy finds a pipe by nominal size and schedule: "6", "40".
func PipeBy(nps, schedule string) (Pipe, error) {
	for _, p := range pipes().Pipes {
		if p.NPS != nps {
			continue
		}
		var known []string
		for _, w := range p.Walls {
			if w.Schedule == schedule {
				return Pipe{p.ODMM, w.MM}, nil
			}
			known = append(known, w.Schedule)
		}
		return Pipe{}, fmt.Errorf("schedule %q is unknown for NPS %s: want one of %v", schedule, nps, known)
	}
	return Pipe{}, fmt.Errorf("nominal size %q is not in the table: want NPS 1/8 to 48, or give odMM and wallMM", nps)
}

// FilmSize is a sheet of film as it is sold.
type FilmSize struct {
	Name     string  `json:"name"`
	WidthMM  float64 `json:"widthMM"`
	LengthMM float64 `json:"lengthMM"`
}

type filmTable struct {
	Source     string     `json:"source"`
	Confidence string     `json:"confidence"`
	Films      []FilmSize `json:"films"`
}

var films = sync.OnceValue(func() filmTable { return load[filmTable]("films.json") })

// FilmSizes gives the sheets by width and length.
func FilmSizes() []FilmSize { return slices.Clone(films().Films) }

// FilmFor gives the smallest sheet, by area, that is at least so long and so
// wide; it errs when none is.
func FilmFor(lengthMM, widthMM float64) (FilmSize, error) {
	var best FilmSize
	for _, f := range films().Films {
		if f.LengthMM >= lengthMM && f.WidthMM >= widthMM && (best.Name == "" || f.LengthMM*f.WidthMM < best.LengthMM*best.WidthMM) {
			best = f
		}
	}
	if best.Name == "" {
		return FilmSize{}, fmt.Errorf("no sheet holds %.4g x %.4g mm: want at most 480 mm long, or several sheets end to end", lengthMM, widthMM)
	}
	return best, nil
}

// Mark is a lead character or number on the belt round the weld.
type Mark struct {
	Text  string
	ArcMM float64 // along the outer surface from the datum
}

// Lead letters (common practice of the trade): F tells that the image quality
// indicator lay on the film side; a B on the back of the cassette that shows
// light on the film tells of scatter from behind.
const (
	FilmSideLetter = "F"
	BackLetter     = "B"
)

// Belt gives the number marks at the joints of the shots: film i shows the
// weld from mark i to mark i+1, the last one back to mark 0.
func (r Run) Belt() []Mark {
	marks := make([]Mark, r.N)
	for i := range marks {
		marks[i] = Mark{fmt.Sprint(i), float64(i) * r.ArcMM}
	}
	return marks
}

// FilmNames names the films of the run after their marks: "0-1", "1-2", "2-0".
func (r Run) FilmNames() []string {
	names := make([]string, r.N)
	for i := range names {
		names[i] = fmt.Sprintf("%d-%d", i, (i+1)%r.N)
	}
	return names
}
