"""The codes of libclang 18's C header that the lowering distinguishes (CXCursorKind, operator kinds)."""

from __future__ import annotations

from typing import Final

# declarations
STRUCT: Final = 2
UNION: Final = 3
CLASS: Final = 4
ENUM: Final = 5
FIELD: Final = 6
ENUMERATOR: Final = 7
FUNCTION: Final = 8
VARIABLE: Final = 9
PARAMETER: Final = 10
METHOD: Final = 21
NAMESPACE: Final = 22
LINKAGE: Final = 23
CONSTRUCTOR: Final = 24
DESTRUCTOR: Final = 25
CONVERSION: Final = 26
TYPE_PARAMETER: Final = 27
VALUE_PARAMETER: Final = 28
FUNCTION_TEMPLATE: Final = 30
CLASS_TEMPLATE: Final = 31
UNEXPOSED_DECLARATION: Final = 1
STATIC_ASSERT: Final = 602
FUNCTIONS: Final = frozenset({FUNCTION, METHOD, CONSTRUCTOR, DESTRUCTOR, CONVERSION})
RECORDS: Final = frozenset({STRUCT, UNION, CLASS})
#: What a reference to a name leads to, as far as its value or size matters.
DECLARATIONS_OF_NAMES: Final = frozenset({VARIABLE, ENUMERATOR, STRUCT, CLASS, UNION, 20, 36, CLASS_TEMPLATE})

# references
TYPE_REFERENCE: Final = 43
BASE: Final = 44
TEMPLATE_REFERENCE: Final = 45
NAMESPACE_REFERENCE: Final = 46
MEMBER_REFERENCE: Final = 47
VARIABLE_REFERENCE: Final = 50
INVALID: Final = range(70, 74)
REFERENCES: Final = frozenset(range(40, 51))

# expressions
UNEXPOSED: Final = 100
DECLARATION_REFERENCE: Final = 101
MEMBER: Final = 102
CALL: Final = 103
INTEGER: Final = 106
FLOATING: Final = 107
STRING: Final = 109
CHARACTER: Final = 110
PARENTHESES: Final = 111
UNARY: Final = 112
SUBSCRIPT: Final = 113
BINARY: Final = 114
COMPOUND_ASSIGNMENT: Final = 115
CONDITIONAL: Final = 116
C_CAST: Final = 117
COMPOUND_LITERAL: Final = 118
BRACED: Final = 119
STATEMENT_EXPRESSION: Final = 121
GNU_NULL: Final = 123
STATIC_CAST: Final = 124
DYNAMIC_CAST: Final = 125
REINTERPRET_CAST: Final = 126
CONST_CAST: Final = 127
FUNCTIONAL_CAST: Final = 128
TRUTH: Final = 130
NULL_POINTER: Final = 131
THIS: Final = 132
SIZE_OF: Final = 136
PACK_SIZE: Final = 143
LAMBDA: Final = 144
EXPRESSIONS: Final = range(100, 160)

# statements
LABEL: Final = 201
COMPOUND: Final = 202
CASE: Final = 203
DEFAULT: Final = 204
IF: Final = 205
SWITCH: Final = 206
WHILE: Final = 207
DO: Final = 208
FOR: Final = 209
GOTO: Final = 210
COMPUTED_GOTO: Final = 211
CONTINUE: Final = 212
BREAK: Final = 213
RETURN: Final = 214
CATCH: Final = 223
ASSEMBLY: Final = 215
TRY: Final = 224
RANGE_FOR: Final = 225
EMPTY: Final = 230
DECLARATIONS: Final = 231
UNEXPOSED_STATEMENT: Final = 200

# preprocessing
MACRO_DEFINITION: Final = 501

#: CXBinaryOperatorKind -> operator; those from ASSIGN to LAST_ASSIGN assign.
BINARY_OPERATORS: Final = {
    **dict(zip(range(3, 10), ("*", "/", "%", "+", "-", "<<", ">>"), strict=True)),
    **dict(zip(range(11, 22), ("<", ">", "<=", ">=", "==", "!=", "&", "^", "|", "&&", "||"), strict=True)),
    33: ",",
}
ASSIGNMENTS: Final = dict(zip(range(22, 33), ("", "*", "/", "%", "+", "-", "<<", ">>", "&", "^", "|"), strict=True))

#: CXUnaryOperatorKind of ``x++ x-- ++x --x``: by, prefix.
STEPS: Final = {1: (1, False), 2: (-1, False), 3: (1, True), 4: (-1, True)}
UNARY_OPERATORS: Final = {5: "&", 6: "*", 7: "+", 8: "-", 9: "~", 10: "!"}
