//! The chosen holding: everything its row in the positions says beside quantity and price, its sensitivities, and its
//! removal. Its factor's diffusion is not edited here.

use crate::desk::commands::{Command, HoldingChange, Queue};
use crate::desk::inputs::{CommittedText, NumberField, Shown, field_row_ui};
use crate::desk::session::Session;
use crate::desk::theme::{self, Palette};
use ebbmark_engine::book::{Exposure, Holding, Kind, LevelUnit, Per};
use egui::{ComboBox, ScrollArea, Ui};

/// Width of a field for text.
const FIELD_POINTS: f32 = 168.0;

/// Draws the form of the holding chosen in the session.
pub fn holding_ui(ui: &mut Ui, session: &Session, queue: &mut Queue) {
    let inputs = &session.document().inputs;
    let chosen = session.view().holding.as_ref();
    let found = inputs.holdings.iter().enumerate().find(|(_, holding)| Some(&holding.name) == chosen);
    let Some((row, holding)) = found else {
        ui.label(theme::soft(ui, "Choose a holding in the book to see and edit all of it"));
        return;
    };
    ScrollArea::vertical().id_salt("holding").auto_shrink(false).show(ui, |ui| {
        ui.set_max_width(ui.available_width() - theme::SCROLL_POINTS);
        form_ui(ui, queue, row, holding);
        for (place, exposure) in inputs.exposures.iter().enumerate() {
            if exposure.holding == holding.name {
                exposure_ui(ui, queue, place, exposure, holding);
            }
        }
        ui.add_space(4.0);
        let remove = Command::RemoveHolding { row };
        let response = ui.button(remove.text()).on_hover_text(remove.tooltip(ui.ctx()));
        if response.clicked() {
            queue.push(remove);
        }
    });
}

fn form_ui(ui: &mut Ui, queue: &mut Queue, row: usize, holding: &Holding) {
    let mut set = |change| queue.push(Command::ChangeHolding { row, change });
    text_ui(ui, "Name", "needed", &holding.name, |name| set(HoldingChange::Name(name)));
    text_ui(ui, "Group", "none; / nests", &holding.group, |group| set(HoldingChange::Group(group)));
    kind_ui(ui, holding.kind, |kind| set(HoldingChange::Kind(kind)));
    let currency = holding.currency.as_deref().unwrap_or("");
    text_ui(ui, "Currency", "the book's", currency, |code| {
        set(HoldingChange::Currency(named(code.to_uppercase())))
    });
    if matches!(holding.kind, Kind::Spot | Kind::Level) {
        let factor = holding.factor.as_deref().unwrap_or("");
        text_ui(ui, "Factor", "its own", factor, |name| set(HoldingChange::Factor(named(name))));
        field_row_ui(ui, "Contract size", |ui| {
            let field = NumberField::new("Contract size", "");
            if let Some(size) = field.ui(ui, holding.multiplier) {
                set(HoldingChange::Multiplier(size));
            }
        });
    }
    if holding.kind == Kind::Level {
        unit_ui(ui, holding.unit, |unit| set(HoldingChange::Unit(Some(unit))));
    }
    field_row_ui(ui, "Carry", |ui| {
        let field = NumberField::new("Carry", "% a year").shown(Shown::Percent);
        let (response, carry) = field.response_ui(ui, holding.carry);
        response.on_hover_text("Income less financing, a share of today's value");
        if let Some(carry) = carry {
            set(HoldingChange::Carry(carry));
        }
    });
}

/// Nothing where the field was emptied.
fn named(text: String) -> Option<String> {
    Some(text.trim().to_owned()).filter(|text| !text.is_empty())
}

fn text_ui(ui: &mut Ui, label: &str, hint: &str, text: &str, set: impl FnOnce(String)) {
    field_row_ui(ui, label, |ui| {
        let field = CommittedText { name: &format!("{label} of the holding"), hint, width: FIELD_POINTS };
        if let Some(typed) = field.ui(ui, text).1 {
            set(typed);
        }
    });
}

fn kind_ui(ui: &mut Ui, chosen: Kind, set: impl FnOnce(Kind)) {
    let kinds = [
        (Kind::Spot, "spot", "Worth quantity times price"),
        (Kind::Level, "level", "Earns its quantity times the change of a level: swaps, futures, spreads"),
        (Kind::Cash, "cash", "Worth its quantity"),
        (Kind::Exposure, "exposure", "Known by its value today and its sensitivities"),
    ];
    choice_ui(ui, "Kind", &kinds, chosen, set);
}

fn unit_ui(ui: &mut Ui, chosen: Option<LevelUnit>, set: impl FnOnce(LevelUnit)) {
    let units = [
        (LevelUnit::Points, "points", "1.00 of the level is one point"),
        (LevelUnit::Percent, "percent", "1.00 of the level is one per cent"),
        (LevelUnit::Bp, "basis points", "1.00 of the level is one basis point"),
    ];
    choice_ui(ui, "Unit of the level", &units, chosen.unwrap_or_default(), set);
}

/// One of a few, each with its word and what it means.
fn choice_ui<T: Copy + PartialEq>(
    ui: &mut Ui,
    label: &str,
    choices: &[(T, &str, &str)],
    chosen: T,
    set: impl FnOnce(T),
) {
    let word = choices.iter().find(|(value, ..)| *value == chosen).map_or("", |(_, word, _)| word);
    let mut picked = None;
    field_row_ui(ui, label, |ui| {
        let combo = ComboBox::from_id_salt(label).selected_text(word).width(FIELD_POINTS);
        let response = combo.show_ui(ui, |ui| {
            for (value, word, meaning) in choices {
                if ui.selectable_label(*value == chosen, *word).on_hover_text(*meaning).clicked() {
                    picked = Some(*value);
                }
            }
        });
        response.response.accessible_name(format!("{label} of the holding"));
    });
    if let Some(value) = picked.filter(|value| *value != chosen) {
        set(value);
    }
}

/// What the holding earns for a move of a factor.
fn exposure_ui(ui: &mut Ui, queue: &mut Queue, row: usize, exposure: &Exposure, holding: &Holding) {
    let per = match exposure.per {
        Per::OnePercent => "+1 %",
        Per::OneBasisPoint => "+1 bp",
        Per::OneUnit => "+1.00",
    };
    field_row_ui(ui, &format!("{per} of {}", exposure.factor), |ui| {
        let name = format!("Sensitivity to {}", exposure.factor);
        let field = NumberField::new(&name, holding.currency.as_deref().unwrap_or(""));
        if let Some(money) = field.ui(ui, exposure.money) {
            queue.push(Command::SetExposure { row, money });
        }
    });
}

/// Which of the two the card shows: the factor or the holding.
pub fn switch_ui(ui: &mut Ui) -> bool {
    let key = egui::Id::unique("shows the holding");
    let mut shows_holding = ui.data(|data| data.get_temp::<bool>(key)).unwrap_or(false);
    ui.horizontal(|ui| {
        for (words, is_holding) in [("Factor", false), ("Holding", true)] {
            if ui.selectable_label(shows_holding == is_holding, words).clicked() {
                shows_holding = is_holding;
            }
        }
    });
    ui.painter().hline(
        ui.max_rect().x_range(),
        ui.cursor().top(),
        egui::Stroke::new(1.0, Palette::of(ui).hairline),
    );
    ui.add_space(3.0);
    ui.data_mut(|data| data.insert_temp(key, shows_holding));
    shows_holding
}
