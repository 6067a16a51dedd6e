package org.merewarden.waterbody;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.hamcrest.Matchers.allOf;
import static org.hamcrest.Matchers.containsString;
import static org.hamcrest.Matchers.not;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.model;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.sql.SQLException;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.dao.DataIntegrityViolationException;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.security.test.context.support.WithMockUser;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.transaction.annotation.Transactional;

@WholeApplication
@Transactional
@WithMockUser(username = "berit", roles = "BIOLOGIST")
class RegisterFormsTest {
    @Autowired
    private MockMvc mvc;

    @Autowired
    private Register register;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private WaterBodies waterBodies;

    @Test
    void aWaterBodyIsAddedAndShownWithItsUnits() throws Exception {
        mvc.perform(post("/water-bodies/new")
                        .with(csrf())
                        .param("code", "form-lake")
                        .param("name", "Form Lake")
                        .param("kind", "reservoir")
                        .param("areaHectares", "1234,5")
                        .param("conductivityMicrosiemensPerCm", "185"))
                .andExpect(redirectedUrl("/water-bodies/form-lake"));

        assertThat(register.waterBody("form-lake").orElseThrow().areaHectares()).isEqualTo(1234.5);
        mvc.perform(get("/water-bodies/form-lake"))
                .andExpect(status().isOk())
                .andExpect(content().string(allOf(containsString("Form Lake"), containsString("185\u00a0µS/cm"))));
        assertThat(jdbc.sql("select actor from activity_entry where subject = 'Form Lake'")
                        .query(String.class)
                        .single())
                .isEqualTo("berit");
    }

    @Test
    void whatIsWrongIsSaidAtItsFieldWithTheValue() throws Exception {
        mvc.perform(post("/water-bodies/new")
                        .with(csrf())
                        .param("code", "Form Lake")
                        .param("name", "")
                        .param("kind", "pond")
                        .param("areaHectares", "-3")
                        .param("meanDepthMetres", "deep"))
                .andExpect(status().is(422))
                .andExpect(model().attributeHasFieldErrors(
                                "form", "code", "name", "kind", "areaHectares", "meanDepthMetres"))
                .andExpect(content()
                        .string(allOf(
                                containsString("at least 0.001, not -3"),
                                containsString(
                                        "is no number such as 1250 or 12.5, without a mark between thousands: “deep”"),
                                containsString("choices: pond"))));
    }

    @Test
    void aTakenCodeAndCrossedDepthsAreRefused() throws Exception {
        new TestRegion(jdbc).lake("taken-lake", "Taken Lake");

        mvc.perform(post("/water-bodies/new")
                        .with(csrf())
                        .param("code", "taken-lake")
                        .param("name", "Another")
                        .param("kind", "lake")
                        .param("areaHectares", "3")
                        .param("meanDepthMetres", "9")
                        .param("maxDepthMetres", "4"))
                .andExpect(status().is(422))
                .andExpect(model().attributeHasFieldErrors("form", "code", "meanDepthMetres"))
                .andExpect(content().string(containsString("“taken-lake” is taken already")));
    }

    @Test
    void theLoserOfTwoChangesSeesBothTexts() throws Exception {
        new TestRegion(jdbc).lake("contested-lake", "Contested Lake");
        change("contested-lake", "0", "First Name").andExpect(redirectedUrl("/water-bodies/contested-lake"));

        change("contested-lake", "0", "Second Name")
                .andExpect(status().isConflict())
                .andExpect(content()
                        .string(allOf(
                                containsString("name First Name"),
                                containsString("name Second Name"),
                                containsString("name=\"version\" value=\"1\""))));
        assertThat(register.waterBody("contested-lake").orElseThrow().name()).isEqualTo("First Name");
    }

    private org.springframework.test.web.servlet.ResultActions change(String code, String version, String name)
            throws Exception {
        return mvc.perform(post("/water-bodies/{l}/edit", code)
                .with(csrf())
                .param("version", version)
                .param("code", code)
                .param("name", name)
                .param("kind", "lake")
                .param("areaHectares", "1000"));
    }

    /** Two who add the same code at the same moment pass the check for it both; the answer for this is a conflict's. */
    @Test
    void theStoreKnowsACodeOnlyOnce() {
        waterBodies.saveAndFlush(twin());
        assertThatThrownBy(() -> waterBodies.saveAndFlush(twin()))
                .isInstanceOf(DataIntegrityViolationException.class)
                .rootCause()
                .isInstanceOfSatisfying(
                        SQLException.class, sql -> assertThat(sql.getSQLState()).isEqualTo("23505"));
    }

    private static WaterBody twin() {
        WaterBody twin = new WaterBody();
        twin.details.code = "twin-lake";
        twin.details.name = "Twin Lake";
        twin.details.areaHectares = 1.0;
        return twin;
    }

    @Test
    void theListIsFilteredByItsAddress() throws Exception {
        new TestRegion(jdbc).lake("filter-lake", "Filtered Tarn");
        mvc.perform(get("/water-bodies").param("name", "filtered t"))
                .andExpect(content().string(containsString("/water-bodies/filter-lake")));
        mvc.perform(get("/water-bodies").param("name", "filtered t").param("kind", "river"))
                .andExpect(content().string(not(containsString("/water-bodies/filter-lake"))));
    }

    @Test
    void aStockIsAddedOnceAndOnlyOfAKnownSpecies() throws Exception {
        new TestRegion(jdbc).lake("stocked-lake", "Stocked Lake");
        mvc.perform(get("/water-bodies/stocked-lake/stocks/new")).andExpect(status().isOk());
        addStock("FPE").andExpect(redirectedUrl("/water-bodies/stocked-lake"));

        addStock("FPE").andExpect(status().is(422)).andExpect(model().attributeHasFieldErrors("form", "species"));
        addStock("QQQ").andExpect(content().string(containsString("no species has the code “QQQ”")));
        mvc.perform(get("/stocks/stocked-lake/FPE/edit")).andExpect(status().isOk());
        mvc.perform(post("/stocks/stocked-lake/FPE/edit")
                        .with(csrf())
                        .param("version", "0")
                        .param("species", "FPI")
                        .param("recruitment", "natural")
                        .param("maxAgeYears", "14"))
                .andExpect(redirectedUrl("/water-bodies/stocked-lake"));
        assertThat(register.stock("stocked-lake", "FPE").orElseThrow().maxAgeYears())
                .isEqualTo(14);
    }

    private org.springframework.test.web.servlet.ResultActions addStock(String species) throws Exception {
        return mvc.perform(post("/water-bodies/stocked-lake/stocks/new")
                .with(csrf())
                .param("species", species)
                .param("recruitment", "natural"));
    }

    @Test
    void sharesBeyondTheWholeNameTheirSum() throws Exception {
        TestRegion region = new TestRegion(jdbc);
        long stock = region.stock(region.lake("shared-lake", "Shared Lake"), "FPE");
        region.right(region.cooperative("form-east", "East"), stock, 70);
        region.cooperative("form-west", "West");

        share("30.5")
                .andExpect(status().is(422))
                .andExpect(model().attributeHasFieldErrors("form", "sharePercent"))
                .andExpect(content().string(containsString("add up to 100.5 %")));
        share("30").andExpect(redirectedUrl("/cooperatives/form-west"));
        mvc.perform(get("/cooperatives/form-west"))
                .andExpect(content().string(containsString("European perch in Shared Lake")));
        share("0").andExpect(redirectedUrl("/cooperatives/form-west"));
        assertThat(register.rightsOfStock(stock)).hasSize(1);
        assertThat(jdbc.sql("select count(*) from activity_entry where subject = 'West, European perch in Shared Lake'")
                        .query(Integer.class)
                        .single())
                .isEqualTo(2);
    }

    private org.springframework.test.web.servlet.ResultActions share(String percent) throws Exception {
        return mvc.perform(post("/cooperatives/form-west/rights")
                .with(csrf())
                .param("stock", "shared-lake:FPE")
                .param("sharePercent", percent));
    }

    @Test
    void cooperativesAndFactorsHaveTheirPages() throws Exception {
        mvc.perform(post("/cooperatives/new")
                        .with(csrf())
                        .param("code", "form-coop")
                        .param("name", "Form Coop"))
                .andExpect(redirectedUrl("/cooperatives/form-coop"));
        mvc.perform(get("/cooperatives")).andExpect(content().string(containsString("Form Coop")));
        mvc.perform(get("/cooperatives/form-coop/edit")).andExpect(status().isOk());
        mvc.perform(post("/species-weights")
                        .with(csrf())
                        .param("species", "HUC")
                        .param("presentation", "gutted")
                        .param("validFrom", "2020-01-01")
                        .param("factor", "0.9"))
                .andExpect(status().is(422))
                .andExpect(model().attributeHasFieldErrors("form", "factor"));
        mvc.perform(post("/species-weights")
                        .with(csrf())
                        .param("species", "HUC")
                        .param("presentation", "gutted")
                        .param("validFrom", "2020-01-01")
                        .param("factor", "1.2"))
                .andExpect(redirectedUrl("/species-weights"));
        mvc.perform(get("/species-weights")).andExpect(content().string(containsString("1.2")));
    }

    @Test
    void whatIsNotThereIsNotFound() throws Exception {
        mvc.perform(get("/water-bodies/nowhere")).andExpect(status().isNotFound());
        mvc.perform(get("/stocks/nowhere/FPE/edit")).andExpect(status().isNotFound());
        mvc.perform(get("/cooperatives/nobody")).andExpect(status().isNotFound());
    }
}
