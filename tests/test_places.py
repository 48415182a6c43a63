"""Shipped files are found in a checkout and in an installed package."""

from __future__ import annotations

from pathlib import Path

import pytest

from heatledger import places


def test_a_checkout_has_them_at_its_top() -> None:
    assert places.shipped_folder("weather") == Path(__file__).resolve().parents[1] / "weather"


def test_an_installed_package_has_them_inside(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "heatledger" / "weather").mkdir(parents=True)
    monkeypatch.setattr(places, "__file__", str(tmp_path / "heatledger" / "places.py"))
    assert places.shipped_folder("weather") == tmp_path / "heatledger" / "weather"
