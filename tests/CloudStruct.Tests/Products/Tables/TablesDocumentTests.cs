using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Products.Tables;

public class TablesDocumentTests
{
    [Fact]
    public void The_page_on_tables_says_what_the_program_writes()
    {
        string received = TablesDocument.Text();
        string page = File.ReadAllText(Repo.Path("docs/tables.md")).ReplaceLineEndings("\n");
        if (page != received) File.WriteAllText(Path.Combine(AppContext.BaseDirectory, "tables.received.md"), received);
        Assert.Equal(received, page);
    }
}
