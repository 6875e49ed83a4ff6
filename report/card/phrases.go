package card

import (
	"fmt"
	"io/fs"
	"slices"
	"strings"

	"clampback/report/figure"
	"clampback/templates"
)

// phrases are the words of a card by key. A phrase that is missing or not filled
// is noted and ends the card with an error: a blank never gets printed.
type phrases struct {
	texts    map[string]string
	problems []string
}

// caution is a warning with when it applies.
type caution struct{ when, hazard, text string }

// readPhrases reads a catalogue of a folder laid out as templates is.
func readPhrases(folder fs.FS, language string) (*phrases, error) {
	rows, err := templates.Rows(folder, "cards/"+language+".csv", 2)
	if err != nil {
		return nil, err
	}
	p := &phrases{texts: map[string]string{}}
	for _, r := range rows {
		p.texts[r[0]] = r[1]
	}
	return p, nil
}

func readCautions(folder fs.FS) ([]caution, error) {
	rows, err := templates.Rows(folder, "cautions.csv", 4)
	if err != nil {
		return nil, err
	}
	cautions := make([]caution, len(rows))
	for i, r := range rows {
		cautions[i] = caution{r[1], r[2], r[3]}
	}
	return cautions, nil
}

// say returns a phrase with its {names} filled from pairs of name and value. A
// value stays on the line of the word behind it, which most often is its unit.
func (p *phrases) say(key string, pairs ...string) string {
	text, ok := p.texts[key]
	if !ok || text == "" {
		p.note(fmt.Sprintf("the phrase %q is missing", key))
		return key
	}
	if len(pairs) == 0 {
		return text
	}
	fill := make([]string, 0, 2*len(pairs))
	for i := 0; i < len(pairs); i += 2 {
		name, value := "{"+pairs[i]+"}", pairs[i+1]
		fill = append(fill, name+" ", value+string(figure.NoBreak), name, value)
		if !strings.Contains(text, name) {
			p.note(fmt.Sprintf("the phrase %q lacks %s", key, name))
		}
	}
	return strings.NewReplacer(fill...).Replace(text)
}

func (p *phrases) note(problem string) {
	if !slices.Contains(p.problems, problem) {
		p.problems = append(p.problems, problem)
	}
}

// err returns what is wrong with the words that were used.
func (p *phrases) err() error {
	if len(p.problems) == 0 {
		return nil
	}
	return fmt.Errorf("the words of the card: %s", strings.Join(p.problems, "; "))
}
