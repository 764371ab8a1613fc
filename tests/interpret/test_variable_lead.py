"""Variable lead against the worked figures and against a turn-by-turn sum."""

from __future__ import annotations

import pytest

from auditor.interpret.cycles.call import CycleFault
from auditor.interpret.variable_lead import mean_lead, turns
from tests.interpret.programs import carried_out


def test_worked_figures() -> None:
    # 72 mm at F8 K0.3: 7.846 turns, last lead 10.354 (closed form of F n + K n^2 / 2)
    made = turns(72.0, 8.0, 0.3)
    assert made == pytest.approx(7.846, abs=5e-4)
    assert 8.0 + 0.3 * made == pytest.approx(10.354, abs=5e-4)


@pytest.mark.parametrize(("lead", "change"), [(2.0, 0.1), (2.0, 0.0), (4.0, -0.05)])
def test_travel_adds_up_over_small_steps(lead: float, change: float) -> None:
    steps = 20_000
    made = turns(30.0, lead, change)
    # the lead in the middle of each small step, summed
    travel = sum((lead + change * made * (i + 0.5) / steps) * made / steps for i in range(steps))
    assert travel == pytest.approx(30.0, rel=1e-9)


def test_lead_that_falls_to_nothing() -> None:
    with pytest.raises(CycleFault):
        turns(100.0, 2.0, -0.05)


def test_a_variable_thread_runs_with_its_mean_lead() -> None:
    found = carried_out("G97 S300 M3\nG0 X30. Z2.\nG34 Z-70. F8. K0.3")
    assert found.not_audited == ()
    assert found.moves[-1].lead == pytest.approx(mean_lead(72.0, 8.0, 0.3))
