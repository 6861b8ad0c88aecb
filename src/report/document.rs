//! A neutral document: headings, tables and notes, without a medium.

/// Whether something is good news.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Tone {
    /// It is.
    Good,
    /// It is not.
    Bad,
    /// It is a doubt.
    Doubt,
    /// Neither.
    Plain,
}

/// How a column's cells stand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Align {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

/// A column of a table.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Column {
    /// Its title; a second line holds the unit.
    pub title: String,
    /// How its cells stand.
    pub align: Align,
}

/// A table.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Table {
    /// Its columns.
    pub columns: Vec<Column>,
    /// Its rows, one cell a column.
    pub rows: Vec<Vec<String>>,
}

impl Table {
    /// A table with the given columns; a title that begins with `<` stands left.
    pub fn new(titles: &[&str]) -> Table {
        let columns = titles
            .iter()
            .map(|title| match title.strip_prefix('<') {
                Some(title) => Column {
                    title: title.into(),
                    align: Align::Left,
                },
                None => Column {
                    title: (*title).into(),
                    align: Align::Right,
                },
            })
            .collect();
        Table {
            columns,
            rows: Vec::new(),
        }
    }
}

/// One piece of a document.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Block {
    /// What the document is about.
    Title(String),
    /// The answer, in a word and what belongs to it.
    Verdict {
        /// The word.
        word: String,
        /// The rest of the line.
        rest: String,
        /// Whether it is good news.
        tone: Tone,
    },
    /// The beginning of a section.
    Heading(String),
    /// Running text.
    Text(String),
    /// Lines that are drawn with letters and kept as they are.
    Drawing(Vec<String>),
    /// A table.
    Table(Table),
    /// A line of a list, with what it begins with.
    Item {
        /// What it begins with.
        mark: String,
        /// Its text.
        text: String,
        /// Whether it is good news.
        tone: Tone,
    },
}

/// A document.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Document {
    /// Its pieces in order.
    pub blocks: Vec<Block>,
}

impl Document {
    /// Adds a piece.
    pub fn push(&mut self, block: Block) {
        self.blocks.push(block);
    }

    /// Leaves out everything but the verdict.
    pub fn keep_verdict(&mut self) {
        self.blocks
            .retain(|block| matches!(block, Block::Verdict { .. }));
    }

    /// Adds a heading.
    pub fn heading(&mut self, text: impl Into<String>) {
        self.push(Block::Heading(text.into()));
    }

    /// Adds a remark below a table.
    pub fn aside(&mut self, text: impl Into<String>) {
        self.push(Block::Item {
            mark: " ".into(),
            text: text.into(),
            tone: Tone::Plain,
        });
    }

    /// Adds running text.
    pub fn text(&mut self, text: impl Into<String>) {
        self.push(Block::Text(text.into()));
    }
}
