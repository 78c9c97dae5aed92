//! What each JOB code means. It never finds anything.

use crate::diagnostic::Explanation;
use crate::source::{Mark, Source};

const fn job(code: &'static str, title: &'static str, text: &'static str) -> Explanation {
    sourced(
        code,
        (title, text),
        ("the plan against itself", Mark::Derived),
    )
}

const fn sourced(
    code: &'static str,
    words: (&'static str, &'static str),
    source: (&'static str, Mark),
) -> Explanation {
    Explanation {
        code,
        title: words.0,
        text: words.1,
        source: Source {
            cite: source.0,
            mark: source.1,
        },
    }
}

/// Every JOB code.
pub const EXPLANATIONS: &[Explanation] = &[
    job(
        "JOB-01",
        "id that names nobody",
        "Somebody or something is named that the plan does not have: a leader, a sawyer, a saw, a first aider, whoever approves, owns a hazard or says go, or a tree to wait for. The nearest id is named and never taken.",
    ),
    job(
        "JOB-02",
        "trees wait in a circle",
        "Each of these trees is to be felled after another of them, so none can be the first.",
    ),
    job(
        "JOB-03",
        "leader without the role",
        "The job names a leader whose own entry does not say so.",
    ),
    job(
        "JOB-04",
        "sawyer without the role",
        "A tree is given to somebody whose own entry does not say that they cut.",
    ),
    sourced(
        "JOB-05",
        (
            "rescuer is the sawyer",
            "Whoever frees a trapped sawyer cannot be the one who is trapped.",
        ),
        (
            "qualified help for each faller: BCFSC resource package",
            Mark::Opened,
        ),
    ),
    job(
        "JOB-06",
        "id twice",
        "Two saws, features, ways out or hazards with the same id cannot be told apart over the radio.",
    ),
    job(
        "JOB-07",
        "unknown rule set",
        "The plan asks to be held against rules that the program does not have. None is taken in their place.",
    ),
    job(
        "JOB-08",
        "no rule set",
        "Without a rule set only the plan's own contradictions are found.",
    ),
    job(
        "JOB-09",
        "rule set with unknown rules",
        "A rule set from the parts folder switches on codes that name no rule, so something it wants is not looked at.",
    ),
    job(
        "JOB-10",
        "rule set replaced",
        "A rule set from the parts folder stands in the place of the built-in one. Its figures and rules may be weaker.",
    ),
    job(
        "JOB-11",
        "unknown species",
        "Strength, weight and splitting come from the species. An unknown name is not guessed; the nearest known ones are named.",
    ),
    job(
        "JOB-12",
        "something a tree lacks",
        "Without lay, sawyer, height or lean a tree can be neither sized up nor felled by plan. Without a saw nobody can say how long a cut takes.",
    ),
    sourced(
        "JOB-13",
        (
            "crown not measured",
            "A crown on one side can outweigh the stem's own lean. Four paced radii are enough.",
        ),
        ("common practice, no source", Mark::CommonPractice),
    ),
    job(
        "JOB-14",
        "crown above the top",
        "The crown's base is at or above the tree's height: one of the two is misread.",
    ),
    sourced(
        "JOB-15",
        (
            "stump and breast height apart",
            "At the cut a stem is hardly thinner than at breast height and rarely swells past nine fifths of it. One of the two is misread, or the unit is.",
        ),
        ("limits of 0.9 and 1.8", Mark::Judgement),
    ),
    job(
        "JOB-16",
        "defect outside the stem",
        "The defect's place or size does not fit into the stump.",
    ),
    job(
        "JOB-17",
        "hinge as thick as the stem",
        "Nothing is left to cut: the number or its unit is wrong.",
    ),
    job(
        "JOB-18",
        "face past the centre",
        "A face past the centre lets the tree sit on its cut before the hinge is made; with a lean it can go at once.",
    ),
    job(
        "JOB-19",
        "no room for the cuts",
        "Face, hinge and strap together take as much as the whole diameter or more.",
    ),
    job(
        "JOB-20",
        "steps differ from the tree's figures",
        "A step written by hand and the tree's own figure say different things of the same cut. Which of the two was briefed cannot be told afterwards.",
    ),
    sourced(
        "JOB-21",
        (
            "bar too short",
            "A bar shorter than the stump cuts from both sides, and each cut must meet the other. One shorter than half of it does not reach the middle.",
        ),
        ("common practice, no source", Mark::CommonPractice),
    ),
    job(
        "JOB-22",
        "method without its means",
        "A tree that is pulled needs a line, one that is lifted needs wedges.",
    ),
    job(
        "JOB-23",
        "way out into the lay",
        "The way out leads into the half of the ground where the tree comes down.",
    ),
    sourced(
        "JOB-24",
        (
            "fewer than two ways out",
            "A way out can be lost while the tree moves: to a limb, to a trip, to a tree that swings. There is always more than one.",
        ),
        (
            "Gleason 1991, lookouts, communication, escape routes, safety zones",
            Mark::Opened,
        ),
    ),
    job(
        "JOB-25",
        "wind above the limit",
        "The plan expects more wind than the crew agreed to work in.",
    ),
    job(
        "JOB-26",
        "gust limit below the wind limit",
        "A gust is never less than the mean wind, so one of the limits is a slip.",
    ),
    job(
        "JOB-27",
        "trained after the day",
        "A training that lies after the job's day is not there yet.",
    ),
    job(
        "JOB-28",
        "hazard without control or owner",
        "A hazard that is only written down still does what it does. Somebody named does something named about it.",
    ),
    job(
        "JOB-29",
        "meaning of STOP not written",
        "Past the hold line a tree that is left half cut may be worse than one that is finished. What STOP means there is agreed before the day; without words of its own the plan uses the program's.",
    ),
    sourced(
        "JOB-30",
        (
            "two sawyers in one ring",
            "Two sawyers with trees within two tree lengths of each other and no order between them may be felling at the same time.",
        ),
        ("29 CFR 1910.266(h)(1)(iv)", Mark::Opened),
    ),
    job(
        "JOB-31",
        "power line without voltage",
        "The distance to a line follows from its voltage. Without it none is enough.",
    ),
    job(
        "JOB-32",
        "tree without a position",
        "Distances between this tree, others and what is on the site cannot be computed, so nothing is said of them.",
    ),
    job(
        "JOB-33",
        "parts folder not usable",
        "The plan names a folder of its own texts and rule sets, and it cannot be used as it is. The built-in ones are not taken in its place without a word.",
    ),
    tree(
        "TREE-01",
        "no cutting method proposed",
        "The size-up found no way of cutting this tree with a chainsaw alone that keeps the trunk whole by a margin, or something keeps the sums from saying anything. `sizeup` gives every reason; a qualified person is asked.",
    ),
    tree(
        "TREE-02",
        "steps that cannot be carried out",
        "A step means nothing where it stands, such as a hinge trimmed with nothing open behind it.",
    ),
    tree(
        "TREE-03",
        "sequence that fails on the virtual stump",
        "Carried out in this order the stem splits, the bar is pinched or the tree sits back before the hinge is reached. `simulate` shows the centimetre.",
    ),
    tree(
        "TREE-04",
        "two estimates of the mass far apart",
        "The biomass equation and the stem's volume give masses more than a quarter apart: usually a height or a diameter is mistaken. The heavier is used for every load.",
    ),
];

const fn tree(code: &'static str, title: &'static str, text: &'static str) -> Explanation {
    sourced(
        code,
        (title, text),
        ("the size-up and the virtual stump", Mark::Derived),
    )
}
