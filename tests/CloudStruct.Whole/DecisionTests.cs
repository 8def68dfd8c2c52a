using CloudStruct.Whole.Kit;

namespace CloudStruct.Whole;

/// <summary>decisions.csv at the door.</summary>
public class DecisionTests
{
    [Fact]
    public void A_row_that_cannot_be_understood_stops_the_run_before_any_result()
    {
        using var survey = new TempSurvey();
        survey.Text("s/clouds/rock.xyz", "0 0 0\n1 0 0\n0 1 0\n1 1 0\n");
        survey.Text("s/decisions.csv", "action,x_m,y_m,z_m,strike_deg,dip_deg\ndrop,1,2,3,45,60\nerase,1,2,3,45,60\n");
        Built.Ended run = Built.Run(survey.Root, "measure", "s");
        Assert.Equal(3, run.Code);
        Assert.Contains("decisions.csv, line 3, column action", run.Error);
        Assert.Contains("erase", run.Error);
        Assert.DoesNotContain("   at ", run.Error);
        Assert.Single(run.Error.Trim().Split('\n'));
        Assert.False(Directory.Exists(survey["s/results"]));
    }

    [Fact]
    public void A_decision_that_matches_nothing_changes_nothing_and_is_said()
    {
        using var survey = new TempSurvey();
        Clouds.Write(survey["s/clouds/rock.las"], "demo", 5, 100_000);
        Assert.Equal(0, Built.Run(survey.Root, "measure", "s", "--out", "before").Code);
        survey.Text("s/decisions.csv", "action,face_id,x_m,y_m,z_m,strike_deg,dip_deg\ndrop,1,-5,-5,-5,45,60\n");
        Built.Ended run = Built.Run(survey.Root, "measure", "s", "--out", "after");
        Assert.Equal(0, run.Code);
        foreach (string table in (string[])["faces.csv", "contacts.csv", "width.csv", "sets.csv", "dikes.csv"])
        {
            Assert.Equal(File.ReadAllText(survey["before/tables/" + table]), File.ReadAllText(survey["after/tables/" + table]));
        }

        Assert.Contains("no face of this place and attitude was found", File.ReadAllText(survey["after/run.log"]));
        Assert.Contains("\"not_applied\": 1", File.ReadAllText(survey["after/run.json"]));
        Assert.Contains("\"decisions\": null", File.ReadAllText(survey["before/run.json"]));
        Assert.Contains(",no,", File.ReadLines(survey["after/tables/decisions.csv"]).Last());
    }
}
