//! The kinds of entry of format 1, each with its meaning, its fields and who signs it.
//! A test compares this table with the written page `FORMAT.md`; a kind is added, never changed.

/// Who must sign an entry of a kind.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Seal {
    /// Nobody must; where a member `signer` names a person, that person has signed.
    Free,
    /// The person named in the member `signer`.
    Person,
    /// Each person who is present signs one of their own.
    EachPresent,
    /// The crew leader.
    Leader,
}

impl Seal {
    /// The words of the written page.
    pub const fn words(self) -> &'static str {
        match self {
            Self::Free => "-",
            Self::Person => "the signer",
            Self::EachPresent => "each person present",
            Self::Leader => "the leader",
        }
    }
}

/// One kind of entry.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Kind {
    /// Its name in the record.
    pub name: &'static str,
    /// Who signs it.
    pub seal: Seal,
    /// Its own members; a member ending in `*` carries its unit as its name's end.
    pub fields: &'static str,
    /// What it says, in one sentence.
    pub meaning: &'static str,
}

const fn kind(name: &'static str, seal: Seal, fields: &'static str, meaning: &'static str) -> Kind {
    Kind {
        name,
        seal,
        fields,
        meaning,
    }
}

use Seal::{EachPresent, Free, Leader, Person};

/// Every kind, in the order of the day.
#[rustfmt::skip]
pub const KINDS: &[Kind] = &[
    kind("open", Free, "record job plan plan_sha256 leader crew parts program language demo_keys continues", "The record begins and binds the plan, the crew and the texts it is about."),
    kind("roll_call", Free, "present absent keyed_by", "The leader called the roll: who is here and who is not."),
    kind("present", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "This person is here."),
    kind("absent", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "This person is not here today."),
    kind("plan_signed", Person, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "This person stands for the plan as hashed here."),
    kind("own_hazard", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "A person named a hazard they saw themselves."),
    kind("asked", Free, "question who said language keyed_by", "A briefing question was put to a named person."),
    kind("answered", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "The named person's answer to a briefing question."),
    kind("brief_signed", EachPresent, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "A person signs that they heard the briefing and agree to their part."),
    kind("tree_chosen", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "The work turns to this tree."),
    kind("short_talk_done", Free, "tree said language keyed_by", "The short talk before this tree was held."),
    kind("item_answered", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "A checklist item was answered at the tree."),
    kind("remeasured", Free, "tree what planned* measured* typed within told_by keyed_by heard", "A planned value was measured again at the tree."),
    kind("second_look_held", Free, "tree stage item commitment_sha256 told_by keyed_by heard", "A first look is held unseen, as a hash over a nonce and the text."),
    kind("second_look_revealed", Free, "tree stage item number shown what planned* nonce first second equal blind", "Both looks are shown together."),
    kind("second_look_lost", Free, "item", "A held look was lost, so both are asked again."),
    kind("sized_up", Free, "tree because card changes", "The figures, steps and findings as they were shown."),
    kind("step_done", Person, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "A step was confirmed with its value."),
    kind("step_skipped", Free, "tree step reason told_by keyed_by heard", "A step was left out, with the reason."),
    kind("step_taken_back", Free, "tree stage item told_by keyed_by heard", "A confirmation was taken back by naming its entry."),
    kind("refused_keys", Free, "count", "Keys that did nothing were counted."),
    kind("stop", Free, "keyed_by", "STOP, written at once and unsigned."),
    kind("stop_reason", Person, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "Who called the stop and why."),
    kind("resumed", Free, "-", "Work goes on after a stop."),
    kind("reopened", Free, "-", "The program was opened again on this record and went on."),
    kind("keep_place", Free, "keyed_by", "The person at the keys turned away and kept the place."),
    kind("talk_again", Free, "changes", "A changed fact voided the agreement; old and new stand side by side."),
    kind("signed_again", Person, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "A person agrees again after a change."),
    kind("reading", Free, "what value* typed told_by keyed_by heard", "A reading taken during the work, such as the wind."),
    kind("own_call", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "The crew's own call, beside the computed state."),
    kind("hold_item", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "An item of the hold line was answered."),
    kind("go", Person, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "One person's go at the hold line."),
    kind("brisk_start", Free, "tree stage item shown told_by keyed_by heard", "The brisk stretch began."),
    kind("brisk_stop_called", Free, "keyed_by", "STOP was called within the brisk stretch; its clock runs on."),
    kind("brisk_end", Free, "tree stage item outcome took_ms told_by keyed_by heard", "The brisk stretch ended."),
    kind("outcome", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "What the tree did."),
    kind("stump_measured", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "A value measured on the stump afterwards."),
    kind("all_clear", Person, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "The tree is finished and everyone may come in."),
    kind("head_count", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "Everyone was counted."),
    kind("near_miss", Free, "tree text told_by keyed_by heard", "Something nearly went wrong."),
    kind("note", Free, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "A remark."),
    kind("late_entry", Free, "happened_utc text told_by keyed_by", "Something that happened earlier is written down late."),
    kind("correction", Free, "corrects member text reason keyed_by", "An earlier entry was wrong; it stays, and this says what is right."),
    kind("trouble_opened", Free, "tree card step keyed_by", "A trouble card was opened."),
    kind("trouble_line_done", Free, "tree card line answer told_by keyed_by heard", "A line of a trouble card was done."),
    kind("join", Free, "who role keyed_by", "A person came to the job."),
    kind("leave", Free, "who reason keyed_by", "A person left the job."),
    kind("lost_contact", Free, "who last_heard_utc keyed_by", "A person could not be reached."),
    kind("hand_over", Free, "to", "The laptop was handed over."),
    kind("plan_replaced", Free, "plan_sha256 was_sha256 reason keyed_by", "Another plan holds from here; all talk again."),
    kind("left_standing", Person, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "A tree was left standing with cuts in it."),
    kind("clock_step", Free, "moved_ms", "The wall clock was moved against the machine's own clock."),
    kind("receipt_shown", Free, "shown_seq code", "A record code was shown to be carried away."),
    kind("recover", Free, "how torn_bytes torn_sha256 error_number lost_seq", "Writing went on after a torn or failed write."),
    kind("sign_out", EachPresent, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "A person signs out of the job."),
    kind("close", Leader, "who tree stage item number shown said language values holds talk_again told_by keyed_by heard", "The leader closes the record; only its signature follows."),
    kind("sig", Free, "signs who sig", "The signature over the line before it."),
];

/// The row of a kind, or `None` where format 1 does not know it.
pub fn find(name: &str) -> Option<&'static Kind> {
    KINDS.iter().find(|kind| kind.name == name)
}

/// Whether an entry of this kind must have a member `signer`.
pub fn needs_signer(name: &str) -> bool {
    find(name).is_some_and(|kind| kind.seal != Seal::Free)
}

/// Whether a kind may still be written when the last tenth of the record's limits is reached.
pub fn kept_for_the_end(name: &str) -> bool {
    matches!(
        name,
        "stop"
            | "stop_reason"
            | "brisk_stop_called"
            | "brisk_end"
            | "outcome"
            | "all_clear"
            | "head_count"
            | "left_standing"
            | "lost_contact"
            | "receipt_shown"
            | "recover"
            | "sign_out"
            | "close"
    )
}
