package org.merewarden.season;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import java.util.UUID;
import java.util.stream.Stream;

/** A landing slip as typed: texts, so that what cannot be read comes back as it was written. */
class LandingForm {
    static final int LINES = 3;

    private String key = "";
    private String date = "";
    private String lake = "";
    private String cooperative = "";
    private String sector = "commercial";
    private String gear = "";
    private String nets = "";
    private String nights = "";
    private String slip = "";
    private String place = "";
    private String note = "";
    private String reason = "";
    private List<Line> lines = new ArrayList<>();

    /** An empty form of today under a key of its own. */
    static LandingForm fresh(LocalDate today) {
        LandingForm form = new LandingForm();
        form.key = UUID.randomUUID().toString();
        form.date = today.toString();
        form.fill();
        return form;
    }

    /** A form that shows a stored row, to be corrected. */
    static LandingForm of(LandingRow row) {
        Entry e = row.entry();
        LandingForm form = new LandingForm();
        form.key = UUID.randomUUID().toString();
        form.date = e.landedOn().toString();
        form.lake = e.lake();
        form.cooperative = Texts.orEmpty(e.cooperative());
        form.sector = e.sector();
        form.gear = Texts.orEmpty(e.gear());
        form.nets = Texts.plain(e.nets());
        form.nights = Texts.plain(e.nights());
        form.slip = Texts.orEmpty(e.slip());
        form.place = Texts.orEmpty(e.place());
        form.note = Texts.orEmpty(e.note());
        Line line = new Line();
        line.species = e.speciesKey();
        line.weight = Texts.plain(e.weightKg());
        line.presentation = e.presentation();
        line.fate = e.fate();
        line.number = e.number() == null ? "" : e.number().toString();
        form.lines.add(line);
        return form;
    }

    /** As many lines as the page offers without a script. */
    void fill() {
        while (lines.size() < LINES) {
            lines.add(new Line());
        }
    }

    String address() {
        return Stream.of(
                        "lake=" + Texts.encode(lake),
                        "cooperative=" + Texts.encode(cooperative),
                        "gear=" + Texts.encode(gear))
                .filter(part -> !part.endsWith("="))
                .reduce((a, b) -> a + "&" + b)
                .orElse("");
    }

    /** One species of the slip. */
    static class Line {
        private String species = "";
        private String otherSpecies = "";
        private String weight = "";
        private String presentation = "whole";
        private String fate = "kept";
        private String number = "";

        boolean blank() {
            return Stream.of(species, otherSpecies, weight, number).allMatch(String::isBlank);
        }

        public String getSpecies() {
            return species;
        }

        public void setSpecies(String species) {
            this.species = species.trim();
        }

        public String getOtherSpecies() {
            return otherSpecies;
        }

        public void setOtherSpecies(String otherSpecies) {
            this.otherSpecies = otherSpecies.trim();
        }

        public String getWeight() {
            return weight;
        }

        public void setWeight(String weight) {
            this.weight = weight.trim();
        }

        public String getPresentation() {
            return presentation;
        }

        public void setPresentation(String presentation) {
            this.presentation = presentation.trim();
        }

        public String getFate() {
            return fate;
        }

        public void setFate(String fate) {
            this.fate = fate.trim();
        }

        public String getNumber() {
            return number;
        }

        public void setNumber(String number) {
            this.number = number.trim();
        }
    }

    public String getKey() {
        return key;
    }

    public void setKey(String key) {
        this.key = key.trim();
    }

    public String getDate() {
        return date;
    }

    public void setDate(String date) {
        this.date = date.trim();
    }

    public String getLake() {
        return lake;
    }

    public void setLake(String lake) {
        this.lake = lake.trim();
    }

    public String getCooperative() {
        return cooperative;
    }

    public void setCooperative(String cooperative) {
        this.cooperative = cooperative.trim();
    }

    public String getSector() {
        return sector;
    }

    public void setSector(String sector) {
        this.sector = sector.trim();
    }

    public String getGear() {
        return gear;
    }

    public void setGear(String gear) {
        this.gear = gear.trim();
    }

    public String getNets() {
        return nets;
    }

    public void setNets(String nets) {
        this.nets = nets.trim();
    }

    public String getNights() {
        return nights;
    }

    public void setNights(String nights) {
        this.nights = nights.trim();
    }

    public String getSlip() {
        return slip;
    }

    public void setSlip(String slip) {
        this.slip = slip.trim();
    }

    public String getPlace() {
        return place;
    }

    public void setPlace(String place) {
        this.place = place.trim();
    }

    public String getNote() {
        return note;
    }

    public void setNote(String note) {
        this.note = note.trim();
    }

    public String getReason() {
        return reason;
    }

    public void setReason(String reason) {
        this.reason = reason.trim();
    }

    public List<Line> getLines() {
        return lines;
    }

    public void setLines(List<Line> lines) {
        this.lines = lines;
    }
}
