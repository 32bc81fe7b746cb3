package lang

import "fmt"

func PrintExpr(x Expr) string { return fmt.Sprint(x.Place()) }
