package register

import "strings"

// chunk is a run of lines that is parsed as one document.
type chunk struct {
	first int // number of its first line
	lines []string
}

// split cuts a register into its head (everything but the joints, line numbers
// kept) and one chunk a joint, so that each joint parses alone: a slip in one does
// not hide the others, and the time stays linear. A register whose joints are
// not a block list at the top is all head.
func split(s *source) (head chunk, joints []chunk) {
	head = chunk{1, append([]string(nil), s.lines...)}
	begin := -1
	for i, line := range s.lines {
		if key, _, _ := strings.Cut(line, "#"); strings.TrimRight(key, " ") == "joints:" {
			begin = i + 1
			break
		}
	}
	if begin < 0 {
		return head, nil
	}
	indent := itemIndent(s.lines[begin:])
	if indent < 0 {
		return head, nil
	}
	for i := begin; i < len(s.lines); i++ {
		line := s.lines[i]
		switch {
		case startsItem(line, indent):
			joints = append(joints, chunk{first: i + 1})
		case !isBlank(line) && indentOf(line) <= indent:
			return head, joints // the next key of the head
		}
		if len(joints) > 0 {
			last := &joints[len(joints)-1]
			last.lines = append(last.lines, line)
		}
		head.lines[i] = ""
	}
	return head, joints
}

// itemIndent returns the indentation of the first list item, -1 when the first
// thing is none.
func itemIndent(lines []string) int {
	for _, line := range lines {
		if isBlank(line) {
			continue
		}
		if indent := indentOf(line); startsItem(line, indent) {
			return indent
		}
		return -1
	}
	return -1
}

func indentOf(line string) int { return len(line) - len(strings.TrimLeft(line, " ")) }

// isBlank reports whether a line is empty or a comment.
func isBlank(line string) bool {
	trimmed := strings.TrimLeft(line, " ")
	return trimmed == "" || trimmed[0] == '#'
}

func startsItem(line string, indent int) bool {
	if indentOf(line) != indent || len(line) <= indent || line[indent] != '-' {
		return false
	}
	rest := line[indent+1:]
	return rest == "" || rest[0] == ' '
}
