//! The program as a user runs it: whole commands, their output, their files and their exit status.

pub mod basin;
mod by_elevation;
mod closed_form;
mod corpus;
mod data_faults;
mod drawn_days;
mod drawn_weather;
mod fit;
mod generator_sheet;
mod gradients;
mod ground;
mod humidity;
mod identities;
mod intensity;
mod interrupt;
mod keys;
mod normal;
mod observed;
mod parameter_sets;
mod results;
mod scenario_faults;
mod season_keys;
mod snow_options;
mod streams;
mod tables;
mod units;
mod verdict;
