"""The whole memo: sections 0 to 14 and appendix A."""

from __future__ import annotations

from screener.memo import appendix, back, front, inputs, results, worked
from screener.memo.document import Document
from screener.memo.frame import Frame

_SECTIONS = (
    front.control_section,
    front.question_section,
    front.outcome_section,
    inputs.inputs_section,
    inputs.assumptions_section,
    results.method_section,
    results.results_section,
    results.register_section,
    results.moves_section,
    back.reservations_section,
    back.not_covered_section,
    back.change_section,
    back.assurance_section,
    back.review_section,
    worked.worked_section,
    appendix.appendix_section,
)


def build_memo(
    screening,
    *,
    date: str,
    author: str,
    version: str,
    number: str,
    revision: str,
    status: str = "draft",
    data_digest: str = "",
    case_text: str = "",
    system: str = "si",
) -> Document:
    """Fill the memo from a screening. Says nothing that is not in a finding or an input.

    date (ISO), author, version, number and revision come in as arguments, so
    the same input gives the same document. status is 'draft' or 'for
    checking' (InputError otherwise); checking and approval exist on paper.
    case_text is the case file letter for letter for appendix A, system is
    'si' or 'us'.
    """
    frame = Frame(screening, date, author, version, number, revision, status, data_digest, case_text, system)
    return Document(
        kind="memo",
        title=front.title(frame, "memo"),
        running_head=front.running_head(frame),
        control=front.control(frame),
        sections=tuple(section(frame) for section in _SECTIONS),
    )
