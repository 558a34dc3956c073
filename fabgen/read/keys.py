"""Sections of a design file as classes: annotated fields become a validator of pydantic's core.

The classes read like pydantic models and are validated by the same core, with the same reasons. Only the layer in
between is left out: loading it costs a check more time than all of its own work (see the decision log).
"""

from types import UnionType
from typing import Annotated, Any, ClassVar, NamedTuple, Self, Union, cast, get_args, get_origin

from pydantic_core import CoreSchema, SchemaValidator, ValidationError, core_schema

from fabgen.read.kind import Broken, Context, Kind

ValidationInfo = core_schema.ValidationInfo
_NEEDED: Any = object()


class FieldInfo(NamedTuple):
    """One key of a section.

    Attributes:
        alias: the key in the file.
        annotation: the field's type without its metadata.
        metadata: how the key is read.
        needed: whether it has to be there.
    """

    alias: str
    annotation: Any
    metadata: tuple[Any, ...]
    needed: bool


class _Default(NamedTuple):
    value: Any
    alias: str | None


def Field(*, alias: str | None = None, default: Any = _NEEDED) -> Any:  # noqa: N802 - as in the library it stands for
    """Give a field a key of another name, and a default where it may be left out.

    Args:
        alias: the key; the field's own name by default.
        default: its value when the key is left out; without one it has to be there.
    """
    return _Default(default, alias)


class Keys:
    """A mapping of the design file: a key is a field's alias, else its name; unknown keys are refused."""

    model_fields: ClassVar[dict[str, FieldInfo]] = {}
    _validator: ClassVar[SchemaValidator]

    def __init_subclass__(cls) -> None:
        """Take over the annotated fields."""
        found = dict(cls.model_fields)
        for name, annotated in cls.__annotations__.items():
            written = cls.__dict__.get(name, _NEEDED)
            default = written if isinstance(written, _Default) else _Default(written, None)
            parts = _parts(annotated)
            found[name] = FieldInfo(default.alias or name, parts[0], parts[1:], default.value is _NEEDED)
            if default.value is not _NEEDED:
                setattr(cls, name, default.value)
            elif name in cls.__dict__:
                delattr(cls, name)
        cls.model_fields = found

    @classmethod
    def of(cls, values: dict[str, Any]) -> Self:
        """A section with some fields set and the others at their defaults, unchecked."""
        made = cls()
        made.__dict__.update(values)
        return made

    @classmethod
    def before(cls, value: Any) -> Any:
        """What stands for a section when it may be written in a shorter way."""
        return value

    @classmethod
    def validate(cls, value: Any, context: Context) -> Self:
        """Read a section.

        Args:
            value: a node of the tree.
            context: what fields need to know.

        Raises:
            ValidationError: with every reason.
        """
        if "_validator" not in cls.__dict__:
            cls._validator = SchemaValidator(_section_schema(cls))
        return cast(Self, cls._validator.validate_python(value, context=cast(Any, context)))


class Section:
    """Wraps a section, a row or a value of the top level.

    When it does not validate, its reasons are kept and the rest of the file goes on.
    """

    def read(self, value: Any, handler: Any, info: ValidationInfo[Any]) -> Any:
        """The validated section, or None with the reasons left in the context."""
        context = cast(Context, info.context)
        try:
            return handler(value)
        except ValidationError as error:
            context.broken.append(Broken(value, info.field_name or "", error))
            return None


def _parts(annotation: Any) -> tuple[Any, ...]:
    """A type and its metadata."""
    origin: Any = get_origin(annotation)
    return get_args(annotation) if origin is Annotated else (annotation,)


def keys_in(annotation: Any) -> type[Keys] | None:
    """The section named in an annotation such as `BoomKeys | None`."""
    if isinstance(annotation, type) and issubclass(annotation, Keys):
        return annotation
    origin: Any = get_origin(annotation)
    parts = get_args(annotation)[:1] if origin is Annotated else get_args(annotation)
    return next((found for part in parts if (found := keys_in(part)) is not None), None)


def one_of(annotation: Any) -> Any:
    """`X` of `X | None`; anything else as it is."""
    if get_origin(annotation) in (Union, UnionType):
        return next(part for part in get_args(annotation) if part is not type(None))
    return annotation


def _section_schema(model: type[Keys]) -> CoreSchema:
    fields = {}
    for name, info in model.model_fields.items():
        schema = _field_schema(info.annotation, info.metadata)
        if not info.needed:
            schema = core_schema.with_default_schema(schema, default=getattr(model, name))
        fields[name] = core_schema.model_field(schema, validation_alias=info.alias)
    section = core_schema.model_fields_schema(fields, extra_behavior="forbid")
    made = core_schema.no_info_after_validator_function(lambda parts: model.of(parts[0]), section)
    if "before" not in model.__dict__:
        return made
    return core_schema.no_info_before_validator_function(model.before, made)


def _field_schema(annotation: Any, metadata: tuple[Any, ...]) -> CoreSchema:
    kind = next((each for each in metadata if isinstance(each, Kind)), None)
    schema = core_schema.with_info_plain_validator_function(kind.read) if kind else _type_schema(one_of(annotation))
    section = next((each for each in metadata if isinstance(each, Section)), None)
    return core_schema.with_info_wrap_validator_function(section.read, schema) if section else schema


def _type_schema(annotation: Any) -> CoreSchema:
    origin, parts = get_origin(annotation), get_args(annotation)
    if origin is Annotated:
        return _field_schema(parts[0], parts[1:])
    if origin is list:
        return core_schema.list_schema(_type_schema(parts[0]))
    if origin is dict:
        return core_schema.dict_schema(_type_schema(parts[0]), _type_schema(parts[1]))
    return _section_schema(annotation)
