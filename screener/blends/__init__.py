"""Floor 4: stocks, blending by volume, mass or mole, and the volumes of the trade."""

from screener.blends.blend import Blend, Report
from screener.blends.lab_sheet import LabSheet
from screener.blends.lanes import density, density_at, mix, union
from screener.blends.parts import Part
from screener.blends.properties import VolatilitySheet, volatility_sheet, volatility_sheets
from screener.blends.published import Beside, published_beside_computed
from screener.blends.stocks import Published, Stock, stock, stock_names, stock_titles, stocks

__all__ = [
    "Beside",
    "Blend",
    "LabSheet",
    "Part",
    "Published",
    "Report",
    "Stock",
    "VolatilitySheet",
    "density",
    "density_at",
    "mix",
    "published_beside_computed",
    "stock",
    "stock_names",
    "stock_titles",
    "stocks",
    "union",
    "volatility_sheet",
    "volatility_sheets",
]
