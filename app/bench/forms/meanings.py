"""What fields and choices mean, where the declaration of the model or the chooser leaves it to their names."""

from __future__ import annotations

from pydantic import BaseModel

from solver.model.load import Cushion, Drop, History, Pulse
from solver.model.material import Limit, Material
from solver.model.member import Attachment, Segment
from solver.model.project import Case, Gauge, Run
from solver.model.section import Custom, FilledPipe, HSection, Pipe, Rectangle, SolidRound, VoidedSquare
from solver.model.surroundings import Ground, Layer, Radiation, ShaftTotal, SpringEnd, Toe

FieldOf = tuple[type[BaseModel], str]
OUTER = "From outside to outside."

#: Fields.
OF_FIELDS: dict[FieldOf, str] = {
    (Cushion, "area"): "Area that the blow passes through, across its direction.",
    (Cushion, "thickness"): "Thickness along the blow, in the state in which it is used.",
    (Cushion, "young_modulus"): "Slope of stress over strain while it is pressed together.",
    (Drop, "ram_mass"): "Mass of what falls; rigid, it strikes with all of it at once.",
    (Drop, "drop_height"): "Height through which the ram falls, down to where it touches.",
    (Drop, "impact_velocity"): "Velocity of the ram at the moment at which it touches.",
    (Segment, "name"): "What the segment is called in pictures, findings and messages.",
    (Segment, "material"): "One of the project's materials; the dots bring one from the library.",
    (Segment, "length"): "Length along the member. What lies below moves with it; gauges keep their places.",
    (Custom, "area"): "Area of the section that carries stress.",
    (FilledPipe, "outer_diameter"): OUTER,
    (Pipe, "outer_diameter"): OUTER,
    (SolidRound, "diameter"): "Diameter of the solid section.",
    (Rectangle, "width"): OUTER,
    (Rectangle, "depth"): "From outside to outside, across the width.",
    (VoidedSquare, "width"): OUTER,
    (VoidedSquare, "void_diameter"): "Diameter of the round void along the middle.",
    (HSection, "flange_width"): "Width of each flange.",
    (HSection, "flange"): "Thickness of each flange.",
    (HSection, "web"): "Thickness of the web between the flanges.",
    (Layer, "name"): "What the layer is called in pictures and messages.",
    (Layer, "thickness"): "Thickness of the layer; the first begins at the ground surface.",
    (Radiation, "soil_density"): "Mass of soil with its water per volume.",
    (Radiation, "poisson_ratio"): "Of the soil; nearly 0.5 where it is saturated.",
    (ShaftTotal, "resistance"): "Static resistance along the whole shaft, without the toe.",
    (SpringEnd, "stiffness"): "Force for each length by which the far end moves.",
    (Toe, "resistance"): "Static resistance under the toe that a slow push would have to overcome.",
    (Gauge, "name"): "What the gauge is called in pictures, findings and records.",
    (Material, "name"): "What segments name the material by; they follow when it is changed.",
    (Limit, "reason"): "Why this limit was chosen, in your own words.",
    (Limit, "source"): "Where the value was taken from.",
}
#: Choices, by the field that they decide about.
OF_CHOICES: dict[FieldOf, str] = {
    (Case, "load"): "What sets the member in motion.",
    (Drop, "ram_mass"): "As one rigid mass, or as a rod in which waves run too.",
    (Drop, "drop_height"): "What the speed at impact is worked out from.",
    (Pulse, "quantity"): "Whether the struck end is given a force or a velocity.",
    (History, "quantity"): "Whether the struck end is given a force or a velocity.",
    (Pulse, "shape"): "How the pulse rises and falls in time.",
    (Run, "blows"): "How many blows follow each other, each on the stresses that the last one left.",
    (Segment, "section"): "Shape of the section; the dots bring usual sizes from the library.",
    (Segment, "end_section"): "Whether the section stays the same down to the lower end.",
    (Segment, "joint_above"): "How the segment hangs together with the one above it.",
    (Material, "law"): "How stress follows from strain.",
    (Attachment, "kind"): "What is attached at that place.",
    (Case, "far_end"): "What a wave meets at the far end.",
    (Case, "ground"): "Whether ground holds the member along its shaft.",
    (Ground, "layers"): "Layer by layer, or as one resistance for the whole shaft.",
}


def meaning_of(table: dict[FieldOf, str], model: type[BaseModel], field: str) -> str:
    """The sentence for a field of the model or of what it inherits from, "" where there is none."""
    return next((table[(base, field)] for base in model.__mro__ if (base, field) in table), "")
