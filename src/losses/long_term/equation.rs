//! One line of a method's working.

/// An equation with its numbers in.
#[derive(Debug, Clone, PartialEq)]
pub struct Equation {
    /// What it gives.
    pub symbol: &'static str,
    /// Its right side, in symbols; empty where the job or a table gives the value.
    pub formula: &'static str,
    /// Its right side, in numbers.
    pub numbers: String,
    /// What a table's value is read at; empty where there is a formula.
    pub at: String,
    /// What comes out.
    pub value: f64,
    /// Unit of that, or nothing.
    pub unit: &'static str,
    /// Clause.
    pub clause: &'static str,
    /// Whether the clause is quoted from memory.
    pub from_memory: bool,
}

impl Equation {
    /// An equation, its numbers still to come.
    pub(super) fn new(
        symbol: &'static str,
        value: f64,
        unit: &'static str,
        clause: &'static str,
    ) -> Self {
        Self {
            symbol,
            formula: "",
            numbers: String::new(),
            at: String::new(),
            value,
            unit,
            clause,
            from_memory: false,
        }
    }

    /// What comes out, to six significant digits.
    pub fn value_text(&self) -> String {
        n(self.value)
    }

    /// The right side in symbols and in numbers.
    pub(super) fn by(mut self, formula: &'static str, numbers: String) -> Self {
        self.formula = formula;
        self.numbers = numbers;
        self
    }

    /// What the table's value is read at.
    pub(super) fn at(mut self, at: String) -> Self {
        self.at = at;
        self
    }

    /// Marks what is quoted from memory.
    pub(super) fn recalled(mut self) -> Self {
        self.from_memory = true;
        self
    }
}

/// A number in a working: six significant digits, without the zeros at its end.
pub(super) fn n(value: f64) -> String {
    if value == 0.0 {
        return "0".to_owned();
    }
    let size = value.abs().log10().floor();
    if !(-4.0..9.0).contains(&size) {
        return format!("{value:.5e}");
    }
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "0 to 9"
    )]
    let decimals = (5.0 - size).clamp(0.0, 9.0) as usize;
    let text = format!("{value:.decimals$}");
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}
