"""The design basis of a scenario: how limits of parts are held against demands, chosen once."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field, model_validator

from loads.records.base import Name, Record, several_problems

Factor = Annotated[float, Field(gt=0, le=10, allow_inf_nan=False)]


class Basis(Record):
    """Working stresses with a factor for the category, or strengths with load and resistance factors."""

    method: Literal["working stress", "strength"] = "working stress"
    category: Literal["usual", "unusual", "extreme"] = "usual"
    category_factor: Factor | None = Field(
        default=None, description="By which the category multiplies allowable stresses and forces"
    )
    load_factor: Factor | None = Field(default=None, description="By which demands are multiplied")
    resistance_factor: Annotated[float, Field(gt=0, le=1, allow_inf_nan=False)] | None = Field(
        default=None, description="By which nominal strengths are multiplied"
    )
    source: Name = ""

    @model_validator(mode="after")
    def _factors_of_the_method(self) -> Basis:
        strength = self.method == "strength"
        unused = ("category_factor",) if strength else ("load_factor", "resistance_factor")
        problems = [
            (name, "given", f'is not used by method "{self.method}"; leave it out')
            for name in unused
            if getattr(self, name) is not None
        ]
        if strength:
            problems += [
                (name, "", 'is missing; method "strength" needs it')
                for name in ("load_factor", "resistance_factor")
                if getattr(self, name) is None
            ]
        if problems:
            raise several_problems(problems)
        return self

    @property
    def on_demand(self) -> float:
        """Factor on every demand of a part."""
        return self.load_factor or 1.0

    @property
    def on_limit(self) -> float:
        """Factor on every limit of a part."""
        return (self.resistance_factor if self.method == "strength" else self.category_factor) or 1.0

    @property
    def words(self) -> str:
        """Both factors, for the source of a check."""
        told = f", {self.source}" if self.source else ""
        if self.method == "strength":
            return (
                f"strength, {self.category}: load factor {self.on_demand:g} on the demand, resistance factor "
                f"{self.on_limit:g} on the limit{told}"
            )
        return f"working stress, {self.category}: category factor {self.on_limit:g} on the limit{told}"
