"""Every family of programs by its name."""

from __future__ import annotations

from collections.abc import Callable

from tests.interpret.reference import path_variants, rough_variants, stroke_variants
from tests.interpret.reference.pen import Pen

FAMILIES: dict[str, Callable[[Pen], None]] = {
    make.__name__: make
    for make in (
        stroke_variants.single_cycle,
        stroke_variants.thread_cycle,
        rough_variants.roughing,
        rough_variants.rough_facing,
        rough_variants.pockets,
        rough_variants.face_pockets,
        rough_variants.repeating,
        stroke_variants.pecking_z,
        stroke_variants.pecking_x,
        stroke_variants.multi_pass,
        stroke_variants.one_block_thread,
        stroke_variants.strokes,
        stroke_variants.holes,
        path_variants.arcs,
        path_variants.corner_words,
        path_variants.compensation,
        path_variants.compensated_finish,
    )
}
