package planner_test

import (
	"fmt"
	"go/ast"
	"go/parser"
	"go/token"
	"strconv"

	"github.com/stretchr/testify/require"

	"clampback/planner"
)

// evaluate works out an expression of trace symbols, numbers, + - * / and
// brackets, such as "F_KR_min+F_Z". Values are in the units of the trace.
func evaluate(t require.TestingT, expression string, plan planner.Plan) float64 {
	tree, err := parser.ParseExpr(expression)
	require.NoError(t, err, expression)
	value, err := evaluateTree(tree, plan)
	require.NoError(t, err, expression)
	return value
}

func evaluateTree(tree ast.Expr, plan planner.Plan) (float64, error) {
	switch e := tree.(type) {
	case *ast.ParenExpr:
		return evaluateTree(e.X, plan)
	case *ast.BasicLit:
		return strconv.ParseFloat(e.Value, 64)
	case *ast.Ident:
		for _, l := range plan.Trace {
			if l.Symbol == e.Name {
				return l.Value, nil
			}
		}
		return 0, fmt.Errorf("no trace line %s", e.Name)
	case *ast.BinaryExpr:
		x, err := evaluateTree(e.X, plan)
		if err != nil {
			return 0, err
		}
		y, err := evaluateTree(e.Y, plan)
		if err != nil {
			return 0, err
		}
		switch e.Op {
		case token.ADD:
			return x + y, nil
		case token.SUB:
			return x - y, nil
		case token.MUL:
			return x * y, nil
		case token.QUO:
			return x / y, nil
		}
	}
	return 0, fmt.Errorf("%T is no arithmetic on trace symbols", tree)
}
