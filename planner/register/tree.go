package register

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/goccy/go-yaml"
	"github.com/goccy/go-yaml/ast"
	"github.com/goccy/go-yaml/parser"
	"github.com/goccy/go-yaml/token"
)

// node is a value of a register with its place. A scalar keeps the text it was
// written with: numbers are read with their unit, never as YAML numbers.
type node struct {
	pos     position
	kind    kind
	text    string  // of a scalar
	items   []*node // of a list
	entries []entry // of a mapping, in order
	partial bool    // of a mapping: more keys were meant than could be read
}

type entry struct {
	key   string
	pos   position
	value *node
}

type kind int

const (
	empty kind = iota // a key without a value
	scalar
	list
	mapping
	refused // already a problem; read as absent
)

func (k kind) String() string {
	return [...]string{"empty", "a single value", "a list", "a mapping", "refused"}[k]
}

// get returns the value of a key, nil when it is missing.
func (n *node) get(key string) *node {
	for _, e := range n.entries {
		if e.key == key {
			return e.value
		}
	}
	return nil
}

// parse parses a chunk into a node; nil for an empty document.
func parse(p *problems, c chunk) *node {
	text := strings.Join(c.lines, "\n")
	if len(text) > maxPart {
		p.at(position{c.first, 1}, fmt.Sprintf("this part of the register has %d kB, more than one joint can need",
			len(text)>>10),
			"begin each joint with \"- \" on a line of its own under joints:")
		return nil
	}
	if pos, deep := nesting(c.lines); deep {
		p.at(position{pos.line + c.first - 1, pos.column}, "the brackets nest too deeply",
			p.source.kind.levels())
		return nil
	}
	file, err := parseYAML(text)
	t := &treeBuilder{p, c.first - 1}
	if err != nil {
		t.syntax(err)
		return nil
	}
	for i, doc := range file.Docs {
		if i > 0 && doc.Body != nil {
			t.problem(doc.Start, "a second document begins here", "put each "+p.source.kind.one+" into a file of its own")
			break
		}
	}
	if len(file.Docs) == 0 || file.Docs[0].Body == nil {
		return nil
	}
	return t.node(file.Docs[0].Body)
}

// parseYAML is the library's parser; a panic of it on odd input is an error
// like any other.
func parseYAML(text string) (file *ast.File, err error) {
	defer func() {
		if r := recover(); r != nil {
			err = fmt.Errorf("the text cannot be read as YAML")
		}
	}()
	return parser.ParseBytes([]byte(text), 0, parser.AllowDuplicateMapKey())
}

// treeBuilder turns the library's tree into nodes and refuses what registers do
// not use.
type treeBuilder struct {
	p      *problems
	offset int // lines before the chunk
}

func (t *treeBuilder) syntax(err error) {
	var s *yaml.SyntaxError
	if errors.As(err, &s) && s.GetToken() != nil {
		t.problem(s.GetToken(), "this is not YAML: "+s.GetMessage(),
			"check indentation, colons, quotes and brackets here and in the line above")
		return
	}
	t.p.at(position{t.offset + 1, 1}, "this is not YAML: "+err.Error(),
		"check indentation, colons, quotes and brackets from here on")
}

func (t *treeBuilder) problem(tk *token.Token, message, mend string) {
	t.p.at(t.pos(tk), message, mend)
}

func (t *treeBuilder) pos(tk *token.Token) position {
	if tk == nil || tk.Position == nil {
		return position{t.offset + 1, 1}
	}
	return position{tk.Position.Line + t.offset, max(1, tk.Position.Column)}
}

// node converts a value. What is refused becomes an empty node with a problem.
func (t *treeBuilder) node(v ast.Node) *node {
	tk, kind := v.GetToken(), t.p.source.kind
	n := &node{pos: t.pos(tk)}
	switch v := v.(type) {
	case *ast.MappingNode:
		if len(v.Values) > 0 {
			n.pos = t.pos(v.Values[0].Key.GetToken())
		}
		t.mapping(n, v.Values)
	case *ast.MappingValueNode:
		n.pos = t.pos(v.Key.GetToken())
		t.mapping(n, []*ast.MappingValueNode{v})
	case *ast.SequenceNode:
		n.kind = list
		for _, item := range v.Values {
			n.items = append(n.items, t.node(item))
		}
	case *ast.NullNode:
		n.kind = empty
	case *ast.StringNode:
		n.kind, n.text = scalar, v.Value
	case *ast.LiteralNode:
		n.kind, n.text = scalar, strings.TrimSpace(v.Value.Value)
	case *ast.IntegerNode, *ast.FloatNode, *ast.BoolNode, *ast.InfinityNode, *ast.NanNode:
		n.kind, n.text = scalar, strings.TrimSpace(tk.Value)
	case *ast.AnchorNode:
		n.kind = refused
		t.problem(tk, "anchors are not used in "+kind.many, kind.common)
	case *ast.AliasNode:
		n.kind = refused
		t.problem(tk, "aliases are not used in "+kind.many, kind.common)
	case *ast.TagNode:
		n.kind = refused
		t.problem(tk, "tags are not used in "+kind.many, "remove the tag")
	default:
		n.kind = refused
		t.problem(tk, "this kind of YAML is not used in "+kind.many, "write plain keys, lists and values")
	}
	return n
}

func (t *treeBuilder) mapping(n *node, values []*ast.MappingValueNode) {
	n.kind = mapping
	seen := map[string]position{}
	for _, v := range values {
		tk := v.Key.GetToken()
		if _, merge := v.Key.(*ast.MergeKeyNode); merge {
			t.problem(tk, "merge keys are not used in "+t.p.source.kind.many, t.p.source.kind.common)
			n.partial = true
			continue
		}
		key := tk.Value
		if first, twice := seen[key]; twice {
			t.problem(tk, fmt.Sprintf("the key %s stands here and in line %d", key, first.line), "keep one of them")
			continue
		}
		seen[key] = t.pos(tk)
		n.entries = append(n.entries, entry{key, t.pos(tk), t.node(v.Value)})
	}
}

// alternatives are keys that exclude each other: where a joint states one way,
// the defaults' other ways do not apply to it.
var alternatives = [][][]string{
	{{"thread", "head"}, {"condition"}, {"evidence"}},
	{{"nut"}, {"tapped"}},
	{{"shank"}, {"segments"}},
	{{"snug"}, {"snug_torque"}},
	{{"circle"}, {"rows", "columns", "pitch"}, {"points"}},
	{{"loads"}, {"forces"}}, // of a group
}

// merge lays a joint over the defaults: key by key where both have a mapping,
// else the joint's value stands.
func merge(defaults, own *node) *node {
	if defaults == nil || own == nil || defaults.kind != mapping || own.kind != mapping {
		if own == nil {
			return defaults
		}
		return own
	}
	merged := &node{pos: own.pos, kind: mapping, partial: own.partial || defaults.partial}
	for _, e := range own.entries {
		e.value = merge(defaults.get(e.key), e.value)
		merged.entries = append(merged.entries, e)
	}
	for _, e := range defaults.entries {
		if own.get(e.key) == nil && !excluded(e.key, own) {
			merged.entries = append(merged.entries, e)
		}
	}
	return merged
}

// mergeJoint lays a joint over the defaults. The loads of the group and the axial
// load of one bolt exclude each other too, though they stand on different levels.
func mergeJoint(defaults, own *node) *node {
	merged := merge(defaults, own)
	axial := func(joint *node) bool {
		loads := joint.get("loads")
		return loads != nil && loads.get("axial") != nil
	}
	switch group := own.get("group") != nil; {
	case !group && axial(own):
		return merged.without("group")
	case group && !axial(own) && axial(merged):
		loads := *merged
		loads.entries = slices.Clone(merged.entries)
		for i, e := range loads.entries {
			if e.key == "loads" {
				loads.entries[i].value = e.value.without("axial")
			}
		}
		return &loads
	}
	return merged
}

// without returns a mapping without a key.
func (n *node) without(key string) *node {
	less := *n
	less.entries = slices.DeleteFunc(slices.Clone(n.entries), func(e entry) bool { return e.key == key })
	return &less
}

// excluded reports whether a joint states another way than the key's.
func excluded(key string, own *node) bool {
	for _, ways := range alternatives {
		way := slices.IndexFunc(ways, func(keys []string) bool { return slices.Contains(keys, key) })
		if way < 0 {
			continue
		}
		for i, other := range ways {
			if i != way && slices.ContainsFunc(other, func(k string) bool { return own.get(k) != nil }) {
				return true
			}
		}
	}
	return false
}
