"""Functions: parameters, constructor initialisers, body, and the directives they own."""

from __future__ import annotations

from beatwise.frontend import kinds
from beatwise.frontend.declarations import variable
from beatwise.frontend.libclang import Cursor, children, evaluated, library, usr
from beatwise.frontend.lowering import Lowering, Scope
from beatwise.frontend.members import implied, initial
from beatwise.frontend.options import with_numbers
from beatwise.frontend.statements import block, named_by, told
from beatwise.model.kernel import Directive, Expression, Function, Variable
from beatwise.model.types import CallableType, RecordType, Type


def function(given: Lowering, key: str, definition: Cursor, script: tuple[Directive, ...]) -> Function:
    """A function with its body. ``script`` are the directives that an external script has for its name."""
    lib = library()
    name = given.name(definition)
    record = _record(given, definition)
    outer = given.scope
    given.scope = scope = Scope(name, key, record, labels=_labels(script), outer=outer)
    try:
        scope.constants.update(_template_values(given, definition))
        parameters = [
            variable(given, lib.clang_Cursor_getArgument(definition, index), initial=False)
            for index in range(max(0, lib.clang_Cursor_getNumArguments(definition)))
        ]
        initializers, body_cursor = _parts(given, definition)
        outside = tuple(with_numbers(one, given.constant) for one in script if "label" not in one.options)
        scope.unclaimed += [one for one in outside if named_by(one)]
        body = block(given, body_cursor) if body_cursor is not None else None
        directives = (*(body.directives if body else ()), *outside)
        parameters = _told_parameters(given, parameters)
    finally:
        given.scope = outer
    return Function(
        key,
        name,
        tuple(parameters),
        given.types.read(lib.clang_getResultType(lib.clang_getCursorType(definition))),
        body,
        given.place(definition),
        record.key if isinstance(record, RecordType) and not _is_lambda(given, definition) else None,
        tuple(initializers),
        directives,
        is_extern_c(definition),
        lib.clang_getCursorLinkage(definition) != 4 and definition.kind == kinds.FUNCTION,
    )


def is_extern_c(definition: Cursor) -> bool:
    """Whether a function has the linkage of C: its USR then tells no parameter types."""
    return definition.kind == kinds.FUNCTION and "#" not in usr(definition)


def _record(given: Lowering, definition: Cursor) -> Type | None:
    """The type of the object that ``this`` points to."""
    if definition.kind == kinds.FUNCTION:
        return None
    lib = library()
    parent = lib.clang_getCursorSemanticParent(definition)
    while parent.kind in kinds.RECORDS:
        record = given.types.of(parent)
        if not isinstance(record, CallableType):
            return record
        around = lib.clang_getCursorSemanticParent(parent)  # of a lambda: the object of the method around it
        parent = lib.clang_getCursorSemanticParent(around)
    return None


def _is_lambda(given: Lowering, definition: Cursor) -> bool:
    return isinstance(given.types.of(library().clang_getCursorSemanticParent(definition)), CallableType)


def _labels(script: tuple[Directive, ...]) -> dict[str, tuple[Directive, ...]]:
    found: dict[str, tuple[Directive, ...]] = {}
    for directive in script:
        if label := directive.options.get("label", "").rpartition("/")[2]:
            found[label] = (*found.get(label, ()), directive)
    return found


def _template_values(given: Lowering, definition: Cursor) -> dict[str, int]:
    """The numbers that the template parameters of a function and of its class stand for here."""
    lib = library()
    found: dict[str, int] = {}
    one = definition
    for _ in range(4):
        template = lib.clang_getSpecializedCursorTemplate(one)
        if template.kind in (kinds.FUNCTION_TEMPLATE, kinds.CLASS_TEMPLATE, 32):
            names = [
                child for child in children(template) if child.kind in (kinds.TYPE_PARAMETER, kinds.VALUE_PARAMETER, 29)
            ]
            for index, parameter in enumerate(names):
                if parameter.kind == kinds.VALUE_PARAMETER and index < lib.clang_Cursor_getNumTemplateArguments(one):
                    if lib.clang_Cursor_getTemplateArgumentKind(one, index) == 4:
                        value = lib.clang_Cursor_getTemplateArgumentValue(one, index)
                        found.setdefault(given.name(parameter), value)
        one = lib.clang_getCursorSemanticParent(one)
        if one.kind not in kinds.RECORDS:
            break
        for member in children(one):
            if member.kind == kinds.VARIABLE and isinstance(value := evaluated(member), int):
                found.setdefault(given.name(member), value)
            elif member.kind == kinds.ENUM:
                for item in children(member):
                    found.setdefault(given.name(item), lib.clang_getEnumConstantDeclValue(item))
    return found


def _parts(given: Lowering, definition: Cursor) -> tuple[list[tuple[str, Expression]], Cursor | None]:
    """The initialisers of a constructor, and the body."""
    initializers: list[tuple[str, Expression]] = []
    body = None
    member: Cursor | None = None
    base: Cursor | None = None
    for child in children(definition):
        if child.kind == kinds.COMPOUND:
            body = child
        elif child.kind == kinds.TRY:
            body = next((one for one in children(child) if one.kind == kinds.COMPOUND), None)
        elif definition.kind != kinds.CONSTRUCTOR:
            continue
        elif child.kind == kinds.MEMBER_REFERENCE:
            member, base = library().clang_getCursorReferenced(child), None
        elif child.kind == kinds.TYPE_REFERENCE:
            base = library().clang_getCursorReferenced(child)
        elif child.kind in kinds.EXPRESSIONS:
            if member is not None:
                initializers.append((given.name(member), initial(given, child, given.type(member))))
            elif base is not None:
                initializers.append((given.name(base), given.expression(child)))
            member = base = None
    if definition.kind == kinds.CONSTRUCTOR:
        record = library().clang_getCursorSemanticParent(definition)
        named = {name for name, _ in initializers}
        if given.name(record) not in named:  # another constructor of the class does it
            exact = library().clang_getCursorType(record)
            initializers = [*implied(given, exact, named, given.place(definition)), *initializers]
    return initializers, body


def _told_parameters(given: Lowering, parameters: list[Variable]) -> list[Variable]:
    """The directives that no block's variables answered to reach parameters, else globals of the program."""
    names = {one.name: index for index, one in enumerate(parameters)}
    for directive in given.scope.unclaimed:
        for name in named_by(directive):
            if name in names:
                parameters[names[name]] = told(parameters[names[name]], directive)
            else:
                given.far_directives.append((name, directive))
    return parameters
